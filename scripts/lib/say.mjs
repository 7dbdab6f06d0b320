/** Plain lines for a person at a terminal, and failures that name a way out. */

/** A failure with one plain sentence (`message`) and what the person can do about it (`wayOut`). */
export class Refusal extends Error {
  constructor(sentence, wayOut, { details = [] } = {}) {
    super(sentence);
    this.name = 'Refusal';
    this.wayOut = wayOut;
    this.details = details;
  }
}

export function say(line = '') {
  process.stdout.write(`${line}\n`);
}

/** Says what begins, runs it, and says how long it took when it was noticeable. */
export async function step(title, work) {
  const begun = Date.now();
  say(`· ${title}`);
  const answer = await work();
  const seconds = (Date.now() - begun) / 1000;
  if (seconds >= 3) say(`  done in ${Math.round(seconds)} s`);
  return answer;
}

/** Lines inside a frame; an empty line stays empty. */
export function box(lines) {
  const width = Math.max(...lines.map((line) => line.length));
  const rule = '─'.repeat(width + 2);
  say(`┌${rule}┐`);
  for (const line of lines) say(`│ ${line.padEnd(width)} │`);
  say(`└${rule}┘`);
}

/** Tells a failure: the sentence, the last lines of the log when there are any, and the way out. */
export function tellFailure(error) {
  const write = (line) => process.stderr.write(`${line}\n`);
  write('');
  if (!(error instanceof Refusal)) {
    write(`Something unexpected went wrong: ${error?.stack ?? error}`);
    return;
  }
  write(error.message);
  for (const line of error.details) write(`    ${line}`);
  if (error.wayOut) write(error.wayOut);
}

/** Runs an entry point: a failure becomes plain words and exit code 1. */
export async function runEntryPoint(work) {
  try {
    process.exitCode = (await work()) ?? 0;
  } catch (error) {
    tellFailure(error);
    process.exitCode = 1;
  }
}
