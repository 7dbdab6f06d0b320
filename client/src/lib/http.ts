/** The only place that calls fetch: JSON in and out, refusals as HttpProblem, a lost connection as NetworkFailure. */

export interface ProblemIssue {
  /** Path of the field as the contract names it, such as `cellConstantPerCm` or `limits.0.upper`. */
  path: string;
  message: string;
}

interface ProblemBody {
  title?: string;
  detail?: string;
  code?: string;
  issues?: ProblemIssue[];
  requestId?: string;
}

/** A refusal of the server, as RFC 9457 problem details carry it. */
export class HttpProblem extends Error {
  readonly status: number;
  /** `slice.reason`, from shared/contracts/errors.ts. */
  readonly code: string;
  readonly title: string;
  readonly detail: string | null;
  readonly issues: readonly ProblemIssue[];
  readonly requestId: string | null;

  constructor(status: number, body: ProblemBody) {
    const title = body.title ?? 'The server could not answer.';
    super(body.detail ?? title);
    this.name = 'HttpProblem';
    this.status = status;
    this.code = body.code ?? 'request.unknown';
    this.title = title;
    this.detail = body.detail ?? null;
    this.issues = body.issues ?? [];
    this.requestId = body.requestId ?? null;
  }

  /** The message for one field, so that a form can put it beside that field. */
  issueFor(path: string): string | undefined {
    return this.issues.find((issue) => issue.path === path)?.message;
  }
}

/** The request never reached the server, or its answer never came back. */
export class NetworkFailure extends Error {
  constructor(cause: unknown) {
    super('No connection to the server. Check the network and try again.', { cause });
    this.name = 'NetworkFailure';
  }
}

export type QueryValue = string | number | boolean | null | undefined | readonly (string | number)[];

export interface RequestOptions {
  query?: Readonly<Record<string, QueryValue>>;
  signal?: AbortSignal;
}

export const http = {
  get: <T>(path: string, options: RequestOptions = {}) => request<T>('GET', path, undefined, options),
  post: <T>(path: string, body?: unknown, options: RequestOptions = {}) =>
    request<T>('POST', path, body, options),
  put: <T>(path: string, body?: unknown, options: RequestOptions = {}) =>
    request<T>('PUT', path, body, options),
  patch: <T>(path: string, body?: unknown, options: RequestOptions = {}) =>
    request<T>('PATCH', path, body, options),
  delete: <T>(path: string, body?: unknown, options: RequestOptions = {}) =>
    request<T>('DELETE', path, body, options),
};

/** One exchange as clocks saw it: the server's `Date` header, and this device's time around it, ms. */
export interface ServerDate {
  serverMs: number;
  sentMs: number;
  receivedMs: number;
}

const dateListeners = new Set<(date: ServerDate) => void>();

/** Hear the server's clock with every answer; whoever captures readings compares it with this device's own. */
export function listenToServerDates(listener: (date: ServerDate) => void): () => void {
  dateListeners.add(listener);
  return () => dateListeners.delete(listener);
}

/** Path and query as one address; empty values are left out, lists repeat their key. */
export function withQuery(path: string, query: RequestOptions['query'] = {}): string {
  const pairs = new URLSearchParams();
  for (const [key, value] of Object.entries(query)) {
    if (value == null || value === '') continue;
    for (const one of Array.isArray(value) ? value : [value]) pairs.append(key, String(one));
  }
  const text = pairs.toString();
  return text ? `${path}?${text}` : path;
}

async function request<T>(method: string, path: string, body: unknown, options: RequestOptions): Promise<T> {
  const response = await reach(withQuery(path, options.query), {
    method,
    credentials: 'same-origin',
    headers: {
      accept: 'application/json, application/problem+json',
      // A file goes as it is, under its own type; everything else is JSON.
      ...(body === undefined
        ? {}
        : { 'content-type': body instanceof Blob ? body.type : 'application/json' }),
    },
    ...(body === undefined ? {} : { body: body instanceof Blob ? body : JSON.stringify(body) }),
    ...(options.signal ? { signal: options.signal } : {}),
  });
  const content = await readJson(response);
  if (!response.ok) {
    const problem = (content ?? {}) as ProblemBody;
    const requestId = problem.requestId ?? response.headers.get('x-request-id') ?? undefined;
    throw new HttpProblem(response.status, { ...problem, ...(requestId ? { requestId } : {}) });
  }
  return content as T;
}

async function reach(address: string, init: RequestInit): Promise<Response> {
  const sentMs = Date.now();
  try {
    const response = await fetch(address, init);
    tellServerDate(response.headers.get('date'), sentMs);
    return response;
  } catch (error) {
    // A request that was taken back is no failure; the query client knows what to do with it.
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    throw new NetworkFailure(error);
  }
}

function tellServerDate(header: string | null, sentMs: number): void {
  const serverMs = Date.parse(header ?? '');
  if (Number.isNaN(serverMs)) return;
  for (const listener of dateListeners) listener({ serverMs, sentMs, receivedMs: Date.now() });
}

async function readJson(response: Response): Promise<unknown> {
  const type = response.headers.get('content-type') ?? '';
  if (response.status === 204 || !type.includes('json')) return undefined;
  try {
    return await response.json();
  } catch (error) {
    throw new NetworkFailure(error);
  }
}
