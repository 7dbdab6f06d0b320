/** A slice's refusals as a table: who asks what, and the code and status that must come back, with nothing changed. */
import type { Response } from 'supertest';
import { describe, expect, it } from 'vitest';
import type { ErrorCode } from '../../shared/contracts/errors.ts';
import type { Somebody, TestApp } from './app.ts';

type Verb = 'get' | 'post' | 'patch' | 'put' | 'delete';

export interface Refusal {
  says: string;
  /** null = nobody signed in; a function where the ids are known only later. */
  who: Somebody | null | (() => Somebody);
  ask: () => [verb: Verb, path: string, body?: object];
  code: ErrorCode;
  status: number;
  /** Path of the field that must be named. */
  issue?: string;
}

export function refusals(app: () => TestApp, table: readonly Refusal[]): void {
  describe('refuses', () => {
    it.each(table.map((row) => [`${row.says}: ${row.code}`, row] as const))('%s', async (_says, row) => {
      const who = typeof row.who === 'function' ? row.who() : row.who;
      const agent = who === null ? app().nobody() : await app().as(who);
      const [verb, path, body] = row.ask();
      const before = await app().auditCount();
      app().events.length = 0;

      const answer: Response = await agent[verb](path).send(body);

      expect(answer.body).toMatchObject({ code: row.code, status: row.status });
      expect(answer.status).toBe(row.status);
      expect(answer.type).toBe('application/problem+json');
      if (row.issue) expect(answer.body.issues.map((one: { path: string }) => one.path)).toContain(row.issue);
      expect(await app().auditCount()).toBe(before);
      expect(app().events).toEqual([]);
    });
  });
}
