/** The rules of the tree, executed on the files themselves. Each failure lists the offenders and says what to do. */
import { readdirSync } from 'node:fs';
import { basename, extname } from 'node:path';
import { describe, expect, it } from 'vitest';
import { errorCodes } from '../shared/contracts/errors.ts';
import { slices } from '../shared/contracts/vocabulary.ts';
import { codeUnder, filesUnder, root, textOf, type Import, type SourceFile } from './support/source-files.ts';

const shared = codeUnder('shared');
const server = codeUnder('server');
const client = codeUnder('client');
const simulator = codeUnder('simulator');
const product = [...shared, ...server, ...client, ...simulator];
const everything = [...product, ...codeUnder('tests', 'scripts')];
const everyPath = [...filesUnder('.')];

/** Fails with the offenders and the advice, so that the reader need not open this file. */
const none = (offenders: readonly string[], advice: string): void =>
  expect(offenders, `${advice}\n${offenders.map((one) => `  ${one}`).join('\n')}\n`).toEqual([]);

const pathsWhere = (files: readonly SourceFile[], isOffender: (file: SourceFile) => boolean): string[] =>
  files.filter(isOffender).map(({ path }) => path);

const under =
  (...folders: string[]) =>
  ({ path }: { path: string }): boolean =>
    folders.some((folder) => path.startsWith(`${folder}/`));

const within = (target: string, ...folders: string[]): boolean =>
  folders.some((folder) => target === folder || target.startsWith(`${folder}/`));

/** `file → import` for every import that the rule does not allow. */
const importsAgainst = (
  files: readonly SourceFile[],
  allows: (one: Import, file: SourceFile) => boolean,
): string[] =>
  files.flatMap((file) =>
    file.imports.filter((one) => !allows(one, file)).map((one) => `${file.path} → ${one.target}`),
  );

const oursOnly =
  (...folders: string[]) =>
  (one: Import): boolean =>
    !one.isOurs || within(one.target, ...folders);

describe('the tree', () => {
  it('has the fixed entries at the top and nothing else', () => {
    const fixed = ['README.md', 'DEVELOPERS.md', 'package.json', 'package-lock.json', 'tsconfig.json'];
    const folders = ['shared', 'server', 'client', 'simulator', 'tests', 'scripts'];
    const known = new Set([...fixed, ...folders, 'eslint.config.js', 'node_modules', 'coverage']);
    const others = readdirSync(root).filter((name) => !known.has(name) && !name.startsWith('.'));
    none(others, 'Put it into shared, server, client, simulator, tests or scripts: the top level is fixed.');
  });

  it('names files and folders in kebab-case, after what they do', () => {
    const odd = everyPath.filter((path) => {
      // Python imports a module by its name, which cannot hold a hyphen.
      if (['README.md', 'DEVELOPERS.md'].includes(path) || path.endsWith('.py')) return false;
      return path.split('/').some((name) => !/^\.?[a-z0-9]+(-[a-z0-9]+)*(\.[a-z0-9-]+)*$/.test(name));
    });
    none(odd, 'Rename to kebab-case.');
    const vague = everyPath.filter(
      (path) =>
        /^(utils?|helpers?|common|managers?|misc)$|-(utils?|helpers?|manager)$/.test(
          basename(path, extname(path)),
        ) && path !== 'shared/contracts/common.ts',
    );
    none(vague, 'Name the file after what it does: a pile called utils or helpers has no owner.');
  });

  it('keeps files short', () => {
    // A test file holds the refusals and stories of one slice together.
    const limit = ({ path }: SourceFile): number => (path.startsWith('tests/') ? 750 : 400);
    const long = everything.filter((file) => file.lines > limit(file));
    none(
      long.map((file) => `${file.path}: ${file.lines} lines, at most ${limit(file)}`),
      'Split it by what changes together.',
    );
  });

  it('leaves nothing for later', () => {
    const marks = new RegExp(`\\b(${['TO' + 'DO', 'FIX' + 'ME', 'X' + 'XX'].join('|')})\\b`);
    const texts = everyPath.filter((path) => /\.(ts|tsx|mjs|mts|js|css|html|md)$/.test(path));
    none(
      texts.filter((path) => marks.test(textOf(path))),
      'Do it now, or open an issue: the code carries no reminders.',
    );
    const tests = codeUnder('tests');
    const held = new Set(
      ['it', 'test', 'describe'].flatMap((name) => [`${name}.only`, `${name}.skip`, `${name}.todo`]),
    );
    none(
      pathsWhere(tests, ({ reads }) => [...reads].some((read) => held.has(read))),
      'Run every test, always: mend it or delete it.',
    );
  });

  it('stands on papers and standards, and on no host', () => {
    const words = [
      'lec' + 'ture',
      'tran' + 'script',
      'seed doc' + 'ument',
      'npm' + 'js',
      'cdn\\.',
      'unp' + 'kg',
      'jsdel' + 'ivr',
    ];
    const banned = new RegExp(`\\b(${words.join('|')})`, 'i');
    const exact = new RegExp(`\\btranscription\\b`, 'gi');
    const texts = everyPath.filter((path) => /\.(ts|tsx|mjs|mts|js|css|html|md|json|sql)$/.test(path));
    const told = texts.flatMap((path) =>
      textOf(path)
        .replace(exact, '')
        .split('\n')
        .flatMap((line, index) => (banned.test(line) ? [`${path}:${index + 1}`] : [])),
    );
    none(told, 'Cite the paper or standard itself, and name no package host: npm knows its own.');
  });
});

describe('a slice', () => {
  const folders = readdirSync(`${root}/server/features`, { withFileTypes: true })
    .filter((entry) => entry.isDirectory())
    .map(({ name }) => name);
  /** Arithmetic and a search keep nothing and hide nothing: no table, no rights of their own, nothing to present. */
  const keepNothing = ['calculations', 'search'];
  /** Slices whose table says more than the address. */
  const tableOf: Record<string, string> = { quarantine: 'quarantined_messages' };
  /** Parts of a slice that stand at an address of their own. */
  const inside: Record<string, string[]> = { sites: ['areas'] };
  const filesOf = (slice: string): string[] =>
    filesUnder(`server/features/${slice}`).map((path) => basename(path));

  it.each(folders)('%s has routes, a service, and a guard on what may be done and what leaves', (slice) => {
    const files = filesOf(slice);
    const roles = ['routes.ts', 'service.ts'];
    if (!keepNothing.includes(slice)) roles.push('presenter.ts');
    // Sessions are one's own: nobody is given rights over them.
    if (!keepNothing.includes(slice) && slice !== 'sessions') roles.push('policy.ts');
    none(
      roles.filter((role) => !files.includes(role)),
      `Add to server/features/${slice}:`,
    );
  });

  it.each(folders)('%s carries one name in contract, address, table and live updates', (slice) => {
    none(
      everyPath.includes(`shared/contracts/${slice}.ts`) ? [] : [slice],
      'Write its contract as shared/contracts/<slice>.ts.',
    );
    const own = [slice, ...(inside[slice] ?? [])].map((name) => `/api/${name}`);
    const addresses = [...textOf(`server/features/${slice}/routes.ts`).matchAll(/path: '([^']+)'/g)].map(
      (match) => match[1]!,
    );
    expect(addresses.length, "No route found: write `path: '/api/…'` in the table.").toBeGreaterThan(0);
    none(
      addresses.filter(
        (address) => !own.some((start) => address === start || address.startsWith(`${start}/`)),
      ),
      `Addresses of ${slice} begin with ${own.join(' or ')}.`,
    );
    if (keepNothing.includes(slice)) return;
    const table = tableOf[slice] ?? slice.replaceAll('-', '_');
    const models = filesUnder('server/db/models').map(textOf).join('\n');
    none(models.includes(`'${table}'`) ? [] : [table], 'Name the table after the slice.');
    none(
      (slices as readonly string[]).includes(slice) ? [] : [slice],
      'List it in slices of shared/contracts/vocabulary.ts.',
    );
  });

  it('is mounted', () => {
    const mounted = textOf('server/features/all-routes.ts');
    none(
      folders.filter((slice) => !mounted.includes(`./${slice}/routes.ts`)),
      'Add its table to server/features/all-routes.ts.',
    );
  });

  it('has the same name in the browser', () => {
    const names = readdirSync(`${root}/client/src/features`);
    none(
      names.filter((name) => !folders.includes(name)),
      'Name the folder after the slice whose address it asks.',
    );
    const keys = client
      .filter(under('client/src/features'))
      .flatMap(({ path }) =>
        [...textOf(path).matchAll(/queryKey: \['([a-z-]+)'/g)].map((match) => [path, match[1]!] as const),
      );
    none(
      keys
        .filter(([, key]) => !folders.includes(key) && !(slices as readonly string[]).includes(key))
        .map(([path, key]) => `${path}: ['${key}', …]`),
      'A query key begins with its slice, so that live updates find it.',
    );
  });
});

describe('who imports whom', () => {
  const packages = JSON.parse(textOf('package.json')) as { dependencies: object; devDependencies: object };
  const packageOf = (target: string): string =>
    target
      .split('/')
      .slice(0, target.startsWith('@') ? 2 : 1)
      .join('/');

  it('shared imports no other part', () => {
    const science = shared.filter(under('shared/science'));
    none(
      importsAgainst(science, (one) =>
        one.isOurs ? within(one.target, 'shared/science') : one.target.startsWith('@stdlib/'),
      ),
      'shared/science is pure arithmetic: it imports its own files and statistical functions only.',
    );
    none(
      importsAgainst(shared.filter(under('shared/contracts')), (one) =>
        one.isOurs
          ? within(one.target, 'shared/contracts') || within(one.target, 'shared/science')
          : one.target === 'zod',
      ),
      'Contracts are zod schemas over each other and the words of the science.',
    );
    none(
      importsAgainst(
        shared.filter(under('shared/format')),
        (one) => one.isOurs && within(one.target, 'shared'),
      ),
      'shared/format turns values into text: no packages, no other part.',
    );
  });

  it('the parts meet in shared only', () => {
    none(importsAgainst(server, oursOnly('server', 'shared')), 'Put what both need into shared/.');
    none(importsAgainst(client, oursOnly('client', 'shared')), 'Put what both need into shared/.');
    none(
      importsAgainst(simulator, oursOnly('simulator', 'shared')),
      'The simulator speaks MQTT and knows nothing of the server.',
    );
  });

  it('runs on packages that are listed', () => {
    const used = (files: readonly SourceFile[], listed: object): string[] =>
      importsAgainst(
        files,
        (one) => one.isOurs || one.target.startsWith('node:') || packageOf(one.target) in listed,
      );
    const running = product.filter(({ path }) => path !== 'client/vite.config.ts');
    none(used(running, packages.dependencies), 'List it under dependencies in package.json.');
    none(
      used(everything, { ...packages.dependencies, ...packages.devDependencies }),
      'List it in package.json: what another package happens to bring may go.',
    );
    const builtIns = client.filter(({ path }) => path !== 'client/vite.config.ts');
    none(
      importsAgainst(builtIns, (one) => !one.target.startsWith('node:')),
      'The browser has no Node modules.',
    );
  });

  it('the server goes from routes through services to the database', () => {
    const features = server.filter(under('server/features'));
    const sliceOf = (path: string): string => path.split('/')[2] ?? '';
    const routes = features.filter(({ path }) => path.endsWith('/routes.ts'));
    none(
      importsAgainst(
        routes,
        (one) =>
          one.isTypeOnly || !within(one.target, 'server/db', 'server/realtime', 'server/jobs', 'server/mail'),
      ),
      'Routes reach the database, the live updates and the mail through their service.',
    );
    none(
      importsAgainst(
        features.filter(({ path }) => path !== 'server/features/all-routes.ts'),
        (one, file) =>
          one.isTypeOnly ||
          !within(one.target, 'server/features') ||
          sliceOf(one.target) === sliceOf(file.path) ||
          one.target.endsWith('/service.ts') ||
          // Without state: what may be done, how it leaves, and the columns of a join.
          /\/(policy|presenter)\.ts$/.test(one.target) ||
          (file.path.endsWith('/queries.ts') && one.target.endsWith('/queries.ts')),
      ),
      'From another slice only its service.ts may be used (its policy and presenter for rights and nested answers): ask there.',
    );
    none(
      importsAgainst(
        features.filter(({ path }) => /\/(policy|presenter)\.ts$/.test(path)),
        (one) =>
          one.isTypeOnly ||
          !within(
            one.target,
            'server/db',
            'server/lib/clock.ts',
            'server/ingest',
            'server/realtime',
            'server/mail',
          ),
      ),
      'Policies and presenters decide and shape: give them what they need as arguments.',
    );
    none(
      importsAgainst(
        server.filter(under('server/ingest', 'server/jobs')),
        (one) => !/\/(routes|policy|presenter)\.ts$/.test(one.target),
      ),
      'Ingest and jobs act through services.',
    );
    none(
      importsAgainst(server.filter(under('server/lib')), oursOnly('server/lib')),
      'server/lib holds no domain words and imports nothing of ours.',
    );
  });

  it('the browser composes features in pages, and features do not know each other', () => {
    const inSource = client.filter(under('client/src'));
    none(
      importsAgainst(
        inSource.filter(under('client/src/components', 'client/src/lib')),
        (one) => !within(one.target, 'client/src/features', 'client/src/routes'),
      ),
      'components/ and lib/ know no domain: pass what is needed as props.',
    );
    none(
      importsAgainst(inSource.filter(under('client/src/features')), (one, file) => {
        const own = file.path.split('/').slice(0, 4).join('/');
        return !within(one.target, 'client/src/features', 'client/src/routes') || within(one.target, own);
      }),
      'Compose features in routes/, or move the shared part to components/ or shared/.',
    );
  });
});

describe('one place for each power', () => {
  const calls =
    (...names: string[]) =>
    ({ calls: made }: SourceFile): boolean =>
      made.some((call) => names.includes(call) || names.includes(`.${call.split('.').at(-1)}`));

  it('the environment is read in server/config.ts', () => {
    none(
      pathsWhere(
        [...shared, ...server, ...client],
        ({ path, reads }) => reads.has('process.env') && path !== 'server/config.ts',
      ),
      'Add the variable to server/config.ts and take it from Parts.',
    );
  });

  it('live updates leave from server/realtime/broadcast.ts', () => {
    const emitters = pathsWhere(product, calls('.emit'));
    // The browser asks to watch a room: one line, which lint lets through with its reason.
    const allowed = ['server/realtime/broadcast.ts', 'client/src/lib/live-updates.ts'];
    none(
      emitters.filter((path) => !allowed.includes(path)),
      'Call broadcast.changed or broadcast.readings after commit.',
    );
    const browser = client.flatMap(({ calls: made }) => made.filter((call) => call.endsWith('.emit')));
    expect(browser, 'The browser emits in one line only: watch and unwatch.').toHaveLength(1);
  });

  it('the science has no clock and no chance', () => {
    const science = shared.filter(under('shared/science'));
    none(
      pathsWhere(
        science,
        (file) =>
          calls('Date.now', 'Math.random', 'performance.now')(file) ||
          file.creations.some(({ name, argumentCount }) => name === 'Date' && argumentCount === 0),
      ),
      'Take the time or the random numbers as an argument.',
    );
  });

  it('the server asks its own clock', () => {
    // Identity of a log line and of a mail is not a time that a test moves.
    none(
      pathsWhere(
        server.filter(under('server/features', 'server/jobs')),
        (file) =>
          calls('Date.now')(file) ||
          file.creations.some(({ name, argumentCount }) => name === 'Date' && argumentCount === 0),
      ),
      'Use parts.clock, which tests move.',
    );
  });

  it('numbers and dates become text in shared/format', () => {
    none(
      pathsWhere(
        product.filter((file) => !under('shared/format', 'simulator')(file)),
        calls('.toFixed', '.toPrecision', '.toLocaleString', '.toLocaleDateString', '.toLocaleTimeString'),
      ),
      'Use formatNumber, formatWithUncertainty or formatDateTime of shared/format.',
    );
  });

  it('raw SQL stands in queries.ts and server/db', () => {
    none(
      pathsWhere(server, (file) => {
        const isHome = file.path.startsWith('server/db/') || file.path.endsWith('/queries.ts');
        return !isHome && /sequelize\s*\.query\b/.test(textOf(file.path));
      }),
      'Move the statement to the queries.ts of its slice.',
    );
  });

  it('only scripts and the simulator write to the terminal', () => {
    none(
      pathsWhere([...shared, ...server, ...client], ({ calls: made }) =>
        made.some((call) => call.startsWith('console.')),
      ),
      'Use the log of Parts; in the browser show it to the person.',
    );
  });

  it('every value has a type', () => {
    none(
      pathsWhere(everything, ({ hasAny }) => hasAny),
      'Say what it is, or unknown.',
    );
  });
});

describe('refusal codes', () => {
  it('are all listed, and all given', () => {
    const thrown = server.flatMap(({ path, creations }) =>
      creations.flatMap(({ name, firstText }) =>
        name === 'AppError' && firstText ? [[path, firstText] as const] : [],
      ),
    );
    expect(thrown.length, 'No refusal found: the reading of the source has gone wrong.').toBeGreaterThan(20);
    none(
      thrown.filter(([, code]) => !(code in errorCodes)).map(([path, code]) => `${path}: ${code}`),
      'List the code with its sentence in shared/contracts/errors.ts.',
    );
    const said = new Set(server.flatMap(({ strings }) => [...strings]));
    // The words of a slice may be agreed before its folder stands.
    const stands = new Set([
      'request',
      ...server.filter(under('server/features')).map(({ path }) => path.split('/')[2]),
    ]);
    none(
      Object.keys(errorCodes).filter((code) => stands.has(code.split('.')[0]) && !said.has(code)),
      'Nothing gives this refusal: remove it from shared/contracts/errors.ts.',
    );
  });
});

describe('the science', () => {
  const science = shared.filter(under('shared/science'));

  it('documents every function with unit, example and source', () => {
    // The bibliography is the sources themselves; a guard returns nothing and rests on the limits it is given.
    const isGuard = ({ name }: { name: string }): boolean => /^(require|refuse)[A-Z]/.test(name);
    const functions = science
      .filter(({ path }) => path !== 'shared/science/references.ts')
      .flatMap(({ path, exports }) => exports.map((one) => ({ ...one, path })))
      .filter((one) => one.isFunction && !isGuard(one));
    expect(functions.length, 'No function found: the reading of the source has gone wrong.').toBeGreaterThan(
      50,
    );
    const needed = [
      ['@returns', /@returns/],
      ['@example', /@example/],
      ['a source', /Source/],
    ] as const;
    const lacking = functions.flatMap(({ path, name, doc }) =>
      needed.filter(([, pattern]) => !pattern.test(doc)).map(([what]) => `${path}: ${name} lacks ${what}`),
    );
    none(
      lacking,
      'Write the doc comment as the functions beside it have theirs: equation, units, limits, Source, @example.',
    );
  });
});
