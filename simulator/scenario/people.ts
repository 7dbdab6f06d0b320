import type { PersonSeed } from './types.ts';

/** Accepted only while the demo data is loaded. */
export const demoPassword = 'salt-mark-demo';

const everywhere = null;

export const people: PersonSeed[] = [
  {
    key: 'ines',
    name: 'Ines Falk',
    email: 'technician@corrie.example',
    isDemoSignIn: true,
    grants: [{ role: 'technician', site: everywhere, endsInDays: null }],
  },
  {
    key: 'tomas',
    name: 'Tomas Reik',
    email: 'manager@corrie.example',
    isDemoSignIn: true,
    grants: [{ role: 'manager', site: everywhere, endsInDays: null }],
  },
  {
    key: 'odile',
    name: 'Odile Marsh',
    email: 'operator@corrie.example',
    isDemoSignIn: true,
    grants: [{ role: 'operator', site: everywhere, endsInDays: null }],
  },
  {
    key: 'bram',
    name: 'Bram Osei',
    email: 'auditor@corrie.example',
    isDemoSignIn: true,
    grants: [{ role: 'auditor', site: everywhere, endsInDays: 30 }],
  },
  {
    key: 'wen',
    name: 'Wen Harrow',
    email: 'administrator@corrie.example',
    isDemoSignIn: true,
    grants: [{ role: 'administrator', site: everywhere, endsInDays: null }],
  },
  {
    key: 'pell',
    name: 'Pell Ansgar',
    email: 'pell.ansgar@corrie.example',
    isDemoSignIn: false,
    grants: [{ role: 'technician', site: everywhere, endsInDays: null }],
  },
  {
    key: 'runa',
    name: 'Runa Quist',
    email: 'runa.quist@corrie.example',
    isDemoSignIn: false,
    grants: [
      { role: 'technician', site: 'hollow-fen', endsInDays: null },
      { role: 'operator', site: 'skerry-point', endsInDays: null },
    ],
  },
  {
    key: 'maud',
    name: 'Maud Ellerin',
    email: 'maud.ellerin@corrie.example',
    isDemoSignIn: false,
    grants: [
      { role: 'manager', site: 'skerry-point', endsInDays: null },
      { role: 'manager', site: 'hollow-fen', endsInDays: null },
    ],
  },
  {
    key: 'jory',
    name: 'Jory Penwith',
    email: 'jory.penwith@corrie.example',
    isDemoSignIn: false,
    grants: [{ role: 'operator', site: 'skerry-point', endsInDays: null }],
  },
  {
    key: 'alda',
    name: 'Alda Brock',
    email: 'alda.brock@corrie.example',
    isDemoSignIn: false,
    grants: [{ role: 'operator', site: 'lower-weir', endsInDays: null }],
  },
  {
    key: 'finn',
    name: 'Finn Orrest',
    email: 'finn.orrest@corrie.example',
    isDemoSignIn: false,
    grants: [{ role: 'operator', site: 'quarrybank', endsInDays: null }],
  },
  {
    key: 'sefa',
    name: 'Sefa Lindow',
    email: 'sefa.lindow@corrie.example',
    isDemoSignIn: false,
    grants: [{ role: 'operator', site: 'hollow-fen', endsInDays: null }],
  },
  {
    key: 'ewan',
    name: 'Ewan Tarr',
    email: 'ewan.tarr@corrie.example',
    isDemoSignIn: false,
    grants: [{ role: 'auditor', site: 'lower-weir', endsInDays: -20 }],
  },
];
