import type { Session } from '../../../shared/contracts/sessions.ts';
import type { AreaTab } from '../components/layout/area-tabs.tsx';
import { paths } from '../paths.ts';

/** The pages inside an area, as its tabs; only those that this person may open. */
export const probeTabs: readonly AreaTab[] = [
  { label: 'Probes', to: paths.probes.to() },
  { label: 'Measuring points', to: paths.points.to() },
];

export const standardTabs: readonly AreaTab[] = [
  { label: 'Lots', to: paths.standards.to() },
  { label: 'Instruments', to: paths.instruments.to() },
  { label: 'Calculator', to: paths.calculator.to() },
];

export interface SettingsPage extends AreaTab {
  /** What one does there, in a sentence. */
  sentence: string;
}

export function settingsPages({ can }: Session): SettingsPage[] {
  const pages: (SettingsPage | false)[] = [
    {
      label: 'Sites',
      to: paths.sites.to(),
      sentence: 'Sites, their areas, and how many points and probes each has.',
    },
    can.managePeople && {
      label: 'People',
      to: paths.people.to(),
      sentence: 'Who may sign in, in which role, where, and until when.',
    },
    can.readQuarantine && {
      label: 'Quarantine',
      to: paths.quarantine.to(),
      sentence: 'Device messages that could not be used, and what devices sent that does not fit together.',
    },
    can.readMail && {
      label: 'Mail',
      to: paths.mail.to(),
      sentence: 'Every mail that left or waits to leave, with its text.',
    },
    {
      label: 'Procedures',
      to: paths.procedures.to(),
      sentence: 'How a calibration is done, step by step, and the numbers it is held to.',
    },
    {
      label: 'Organisation',
      to: paths.organisation.to(),
      sentence: 'The name on records, when a comparison is overdue, and what U takes for granted.',
    },
    {
      label: 'Your account',
      to: paths.account.to(),
      sentence: 'Your password, your open sessions, and how this screen is lit.',
    },
  ];
  return pages.filter((page): page is SettingsPage => page !== false);
}
