import type { Health } from '../../shared/contracts/health.ts';
import type { HealthProbe, Parts } from '../parts.ts';

/** A part that does not answer within this is down. */
const patienceMs = 2000;

async function ask(probe: HealthProbe): Promise<{ up: boolean; detail?: string }> {
  let timer: NodeJS.Timeout | undefined;
  const tooLate = new Promise<{ up: boolean; detail: string }>((resolve) => {
    timer = setTimeout(() => resolve({ up: false, detail: 'does not answer' }), patienceMs);
  });
  try {
    return await Promise.race([probe.check(), tooLate]);
  } catch (error) {
    return { up: false, detail: error instanceof Error ? error.message : 'failed' };
  } finally {
    clearTimeout(timer);
  }
}

export async function readHealth(parts: Parts): Promise<Health> {
  const answers = await Promise.all(
    parts.health.map(async (probe) => [probe.name, await ask(probe)] as const),
  );
  return {
    status: answers.every(([, answer]) => answer.up) ? 'ok' : 'failing',
    parts: Object.fromEntries(answers),
  };
}

export const databaseHealth = (parts: Pick<Parts, 'sequelize'>): HealthProbe => ({
  name: 'database',
  check: async () => {
    await parts.sequelize.authenticate();
    return { up: true };
  },
});
