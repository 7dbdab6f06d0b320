import type { Prompt } from '../../../shared/contracts/prompts.ts';
import type { PromptRow } from './queries.ts';

export const presentPrompt = (row: PromptRow): Prompt => ({
  ...row,
  raisedAt: row.raisedAt.toISOString(),
  closedAt: row.closedAt?.toISOString() ?? null,
});
