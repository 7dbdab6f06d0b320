import { errorCodes, errorKinds, type ErrorCode, type ErrorKind } from '../shared/contracts/errors.ts';

export interface FieldIssue {
  path: string;
  message: string;
}

/** Every refusal the server gives on purpose. The sentence and status come from the code. */
export class AppError extends Error {
  readonly code: ErrorCode;
  readonly kind: ErrorKind;
  readonly status: number;
  readonly detail: string | undefined;
  readonly issues: FieldIssue[] | undefined;

  constructor(code: ErrorCode, more: { detail?: string; issues?: FieldIssue[] } = {}) {
    const [kind, sentence] = errorCodes[code];
    super(sentence);
    this.name = 'AppError';
    this.code = code;
    this.kind = kind;
    this.status = errorKinds[kind];
    this.detail = more.detail;
    this.issues = more.issues;
  }
}
