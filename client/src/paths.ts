/** Every address of the product: the pattern the router matches, and the way to write a link to it. */

type ParamNames<Pattern extends string> = Pattern extends `${string}:${infer Name}/${infer Rest}`
  ? Name | ParamNames<Rest>
  : Pattern extends `${string}:${infer Name}`
    ? Name
    : never;
type Query = Readonly<Record<string, string | number | null | undefined>>;
type Arguments<Pattern extends string> = [ParamNames<Pattern>] extends [never]
  ? [query?: Query]
  : [params: Readonly<Record<ParamNames<Pattern>, string | number>>, query?: Query];

function address<const Pattern extends string>(pattern: Pattern) {
  const names = pattern.match(/:\w+/g) ?? [];
  const to = (...given: Arguments<Pattern>): string => {
    const [params, query] = (names.length > 0 ? given : [{}, given[0]]) as [
      Record<string, string | number>,
      Query?,
    ];
    const path = names.reduce<string>(
      (text, name) => text.replace(name, encodeURIComponent(String(params[name.slice(1)]))),
      pattern,
    );
    return path + queryText(query);
  };
  return { pattern, to };
}

function queryText(query: Query = {}): string {
  const pairs = new URLSearchParams();
  for (const [key, value] of Object.entries(query)) {
    if (value != null && value !== '') pairs.set(key, String(value));
  }
  const text = pairs.toString();
  return text ? `?${text}` : '';
}

export const paths = {
  start: address('/'),
  signIn: address('/sign-in'),
  setPassword: address('/set-password'),
  welcome: address('/welcome'),

  live: address('/live'),
  liveSite: address('/live/:siteId'),
  liveWall: address('/live/:siteId/wall'),

  probes: address('/probes'),
  newProbe: address('/probes/new'),
  probe: address('/probes/:id'),
  points: address('/points'),
  newPoint: address('/points/new'),
  point: address('/points/:id'),

  calibrations: address('/calibrations'),
  startCalibration: address('/calibrations/start'),
  reviewCalibrations: address('/calibrations/review'),
  calibration: address('/calibrations/:id'),

  standards: address('/standards'),
  calculator: address('/standards/calculator'),
  newStandard: address('/standards/new'),
  prepareStandard: address('/standards/prepare'),
  diluteStandard: address('/standards/dilute'),
  instruments: address('/standards/instruments'),
  newInstrument: address('/standards/instruments/new'),
  instrument: address('/standards/instruments/:id'),
  standard: address('/standards/:id'),

  records: address('/records'),
  auditTrail: address('/records/audit'),

  settings: address('/settings'),
  sites: address('/settings/sites'),
  newSite: address('/settings/sites/new'),
  site: address('/settings/sites/:id'),
  people: address('/settings/people'),
  newPerson: address('/settings/people/new'),
  person: address('/settings/people/:id'),
  quarantine: address('/settings/quarantine'),
  quarantinedMessage: address('/settings/quarantine/:id'),
  mail: address('/settings/mail'),
  organisation: address('/settings/organisation'),
  procedures: address('/settings/procedures'),
  procedure: address('/settings/procedures/:id'),
  issueProcedure: address('/settings/procedures/:id/issue'),
  account: address('/settings/account'),
} as const;

/** The address to come back to after sign-in; only one of this site, so that no link can lead elsewhere. */
export function returnAddress(to: string | null | undefined): string {
  const isOurs = typeof to === 'string' && /^\/(?![/\\])/.test(to) && !to.startsWith(paths.signIn.pattern);
  return isOurs ? to : paths.live.to();
}
