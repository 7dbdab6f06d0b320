import { HttpProblem } from './http.ts';

/**
 * Runs a write that carries the version the person saw. When somebody was faster, what is stored now is fetched, so
 * that the next press goes on from there, and the person is told; what was typed stays in the form.
 */
export async function refetchOnConflict<Answer>(
  write: () => Promise<Answer>,
  refetch: () => Promise<unknown>,
): Promise<Answer> {
  try {
    return await write();
  } catch (error) {
    if (!(error instanceof HttpProblem) || !error.code.endsWith('.changed-meanwhile')) throw error;
    await refetch();
    throw new Error(
      'Somebody saved a change while you were writing. It has been fetched, and what you wrote is still here. Look at what is stored now; save again to put only your own changes on top of it.',
      { cause: error },
    );
  }
}

/** The fields whose values differ from what the form opened with; only those are sent. */
export function changedFields<Fields extends object>(base: Fields, draft: Fields): Partial<Fields> {
  const keys = Object.keys(draft) as (keyof Fields)[];
  return Object.fromEntries(
    keys
      .filter((key) => JSON.stringify(base[key]) !== JSON.stringify(draft[key]))
      .map((key) => [key, draft[key]]),
  ) as Partial<Fields>;
}
