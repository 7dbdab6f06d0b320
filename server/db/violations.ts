import { BaseError } from 'sequelize';
import type { ErrorCode } from '../../shared/contracts/errors.ts';
import { AppError } from '../errors.ts';

/** Name of the constraint that refused a statement, whatever class Sequelize gave the error. */
function constraintOf(error: unknown): string | undefined {
  if (!(error instanceof BaseError)) return undefined;
  return (error as { parent?: { constraint?: string } }).parent?.constraint;
}

/**
 * Runs `work` and says in our codes what the database refused. The database is asked last, so that two people
 * doing the same at once get the same clear answer as one after the other.
 */
export async function refusingByConstraint<T>(
  codes: Readonly<Record<string, ErrorCode>>,
  work: () => Promise<T>,
): Promise<T> {
  try {
    return await work();
  } catch (error) {
    const code = codes[constraintOf(error) ?? ''];
    throw code ? new AppError(code) : error;
  }
}
