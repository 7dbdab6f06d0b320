import type { Welcome } from '../../../shared/contracts/sessions.ts';

/** Printed by the start command and shown on the sign-in page, only while the demo data is loaded. */
export const demoSignIns: NonNullable<Welcome['demo']> = {
  password: 'salt-mark-demo',
  signIns: [
    {
      email: 'technician@corrie.example',
      name: 'Ines Falk',
      role: 'technician',
      can: 'calibrate, install and move probes',
    },
    {
      email: 'manager@corrie.example',
      name: 'Tomas Reik',
      role: 'manager',
      can: 'set tolerances and intervals, review, register probes',
    },
    {
      email: 'operator@corrie.example',
      name: 'Odile Marsh',
      role: 'operator',
      can: 'watch live status, hold a point',
    },
    {
      email: 'auditor@corrie.example',
      name: 'Bram Osei',
      role: 'auditor',
      can: 'read everything granted, change nothing',
    },
    {
      email: 'administrator@corrie.example',
      name: 'Wen Harrow',
      role: 'administrator',
      can: 'people, sites, devices, mail',
    },
  ],
};
