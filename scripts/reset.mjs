// `npm run reset`: throws the private database's content away and loads the demo again.
import { createInterface } from 'node:readline/promises';
import { readSettings } from './lib/environment.mjs';
import { claimClone, openDatabase, prepareDatabase } from './lib/foundation.mjs';
import { ensurePackages } from './lib/packages.mjs';
import { Refusal, runEntryPoint, say } from './lib/say.mjs';
import { supervise } from './lib/supervisor.mjs';

async function isAgreed() {
  if (process.argv.includes('--yes')) return true;
  if (!process.stdin.isTTY) {
    throw new Refusal(
      'Nobody can be asked here whether to drop the data.',
      'If you are sure: npm run reset -- --yes',
    );
  }
  const questions = createInterface({ input: process.stdin, output: process.stdout });
  try {
    const answer = await questions.question(
      'Drop every reading, check and user of this clone, and load the demo afresh? (yes/no) ',
    );
    return ['y', 'yes'].includes(answer.trim().toLowerCase());
  } finally {
    questions.close();
  }
}

async function reset(supervisor) {
  const settings = readSettings();
  if (settings.outsideDatabase) {
    throw new Refusal(
      'DATABASE_URL is set, and reset only works on the private database of this clone.',
      'Unset DATABASE_URL first.',
    );
  }
  await claimClone(supervisor, { what: 'A reset' });
  if (!(await isAgreed())) {
    say('Nothing was changed.');
    return;
  }
  await ensurePackages({ debian: ['postgresql'], onStart: (child) => supervisor.onStart(child) });
  const opened = await openDatabase(supervisor, settings);
  // As after an interrupted load: what is there is dropped, and the load begins again.
  opened.cluster.remember({ demo: 'loading' });
  const { hasDemo } = await prepareDatabase(supervisor, settings, opened);
  say(
    hasDemo ? 'The demo is loaded afresh. Start it: npm start' : 'The database is empty. Start it: npm start',
  );
}

await runEntryPoint(() => supervise(reset, { untilDone: true }));
