import type { QueryClient } from '@tanstack/react-query';
import type { Calibration } from '../../../../../shared/contracts/calibrations.ts';
import { http, HttpProblem, NetworkFailure } from '../../../lib/http.ts';
import { keepAnswer } from '../api.ts';
import type { SendOutcome } from './deed-queue.ts';
import type { Deed } from './deeds.ts';

/** Sends one deed and puts the run that the server answers with where the bench reads it. */
export async function sendDeed(deed: Deed, userId: number, queryClient: QueryClient): Promise<SendOutcome> {
  try {
    keepAnswer(queryClient, userId, await post(deed));
    return { kind: 'accepted' };
  } catch (error) {
    const outcome = outcomeOf(error);
    // After a refusal the server's own state is what counts; what this phone assumed may be behind it.
    if (outcome.kind === 'refused')
      await queryClient.invalidateQueries({ queryKey: ['calibrations', 'detail', deed.calibrationId] });
    return outcome;
  }
}

async function post(deed: Deed): Promise<Calibration> {
  const run = `/api/calibrations/${deed.calibrationId}`;
  if (deed.kind === 'capture') return http.post<Calibration>(`${run}/captures`, deed.body);
  if (deed.kind === 'step') return http.post<Calibration>(`${run}/steps`, deed.body);
  // The reading may have been captured without network: its id is known only since it went up.
  const { captures } = await http.get<Calibration>(run);
  const id = captures.find((capture) => capture.key === deed.captureKey)?.id ?? 0;
  return http.post<Calibration>(`${run}/captures/${id}/exclude`, deed.body);
}

/** What a failed attempt means for the queue. */
export function outcomeOf(error: unknown): SendOutcome {
  if (error instanceof NetworkFailure) return { kind: 'unreachable' };
  if (!(error instanceof HttpProblem)) throw error;
  if (error.status === 401) return { kind: 'signed-out' };
  if (error.status >= 500 || error.status === 429 || error.status === 408) return { kind: 'unreachable' };
  const issues = error.issues.map((issue) => issue.message).filter((message) => message !== error.message);
  return { kind: 'refused', code: error.code, reason: [error.message, ...issues].join(' ') };
}
