import { z } from 'zod';
import { plainMessage } from '../../shared/contracts/messages.ts';
import { AppError } from '../errors.ts';

/** Every refusal is read by a person: the library's own wording is for programmers. */
z.config({ customError: plainMessage });

/** Parses one part of a request; every issue is answered with its path. */
export function parsePart(
  schema: z.ZodType | undefined,
  value: unknown,
  where: 'path' | 'query' | 'body',
): unknown {
  if (!schema) return undefined;
  const result = schema.safeParse(value ?? {});
  if (result.success) return result.data;
  const issues = result.error.issues.map((issue) => ({
    path: [where === 'body' ? '' : where, ...issue.path.map(String)].filter(Boolean).join('.'),
    message: issue.message,
  }));
  throw new AppError(where === 'path' ? 'request.not-found' : 'request.invalid', { issues });
}
