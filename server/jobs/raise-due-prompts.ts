/** Days pass without anybody doing anything: looks which probes have become due soon or overdue, and says so once. */
import { refreshAllPrompts } from '../features/prompts/service.ts';
import type { Job } from './job.ts';

export const raiseDuePrompts: Job = {
  name: 'raise-due-prompts',
  schedule: '30 */5 * * * *',
  runsAtStart: true,
  run: async ({ parts }) => {
    const changed = await refreshAllPrompts(parts);
    if (changed > 0) parts.log.info({ changed }, 'work prompts brought up to date');
  },
};
