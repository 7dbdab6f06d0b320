import { decisionRules } from '../../../../shared/contracts/vocabulary.ts';
import { DECISION_RULE_LABELS } from '../../../../shared/format/labels.ts';
import type { CalculatorField, Values } from './model.ts';

export type CalculatorKind =
  'standard' | 'dilute' | 'reference' | 'units' | 'concentration' | 'cell-constant' | 'plan';

export interface Calculator {
  kind: CalculatorKind;
  /** On its tab. */
  label: string;
  sentence: string;
  /** The address under /api/calculations. */
  path: string;
  fields: readonly CalculatorField[];
  /** The request for values that are all there. */
  body: (values: Values) => object;
}

const BASES = [
  { value: 'molal', label: 'molal' },
  { value: 'demal', label: 'demal' },
  { value: 'molar', label: 'molar' },
];
const NOMINALS = ['0.01', '0.1', '1'].map((value) => ({ value, label: value }));
const isByLot = (values: Values) => values['by'] === 'lot';
const isByBasis = (values: Values) => values['by'] !== 'lot';

const SOLUTION: readonly CalculatorField[] = [
  {
    name: 'by',
    label: 'Solution',
    isWide: true,
    initial: 'basis',
    options: [
      { value: 'basis', label: 'KCl by its basis' },
      { value: 'lot', label: 'a registered lot' },
    ],
  },
  {
    name: 'standardId',
    path: 'solution.standardId',
    label: 'Lot',
    initial: '',
    options: 'lots',
    isWide: true,
    isShown: isByLot,
  },
  {
    name: 'basis',
    path: 'solution.basis',
    label: 'Basis',
    initial: 'molal',
    options: BASES,
    isShown: isByBasis,
  },
  {
    name: 'nominal',
    path: 'solution.nominal',
    label: 'Nominal value',
    initial: '0.01',
    options: NOMINALS,
    isShown: isByBasis,
  },
  {
    name: 'solventUsCm',
    path: 'solution.solventUsCm',
    label: 'Blank of the water',
    unit: 'µS/cm',
    initial: '0',
    isShown: isByBasis,
  },
];

const TEMPERATURE: CalculatorField = {
  name: 'temperatureC',
  label: 'Temperature',
  unit: '°C',
  initial: '25',
};

const solutionOf = (values: Values) =>
  isByLot(values)
    ? { by: 'lot', standardId: Number(values['standardId']) }
    : {
        by: 'basis',
        basis: values['basis'],
        nominal: Number(values['nominal']),
        solventUsCm: Number(values['solventUsCm']),
      };

const numbers = (values: Values, ...names: string[]) =>
  Object.fromEntries(names.map((name) => [name, Number(values[name])]));

/** Everything the bench asks, in the order in which it is asked. */
export const CALCULATORS: readonly Calculator[] = [
  {
    kind: 'standard',
    label: 'Standard or lot',
    sentence: 'Conductivity of a KCl reference solution, or of a registered lot, at a temperature.',
    path: 'standard-conductivity',
    fields: [...SOLUTION, TEMPERATURE],
    body: (values) => ({ solution: solutionOf(values), ...numbers(values, 'temperatureC') }),
  },
  {
    kind: 'dilute',
    label: 'Dilute KCl',
    sentence:
      'Dilute KCl at a temperature, with the measured conductivity of the water added. Two equations, side by side.',
    path: 'dilute-kcl',
    fields: [
      { name: 'concentrationMolL', label: 'Concentration', unit: 'mol/L', initial: '0.001' },
      TEMPERATURE,
      {
        name: 'solventUsCm',
        label: 'Blank of the water',
        unit: 'µS/cm',
        hint: 'As measured, at this temperature.',
        initial: '1',
      },
    ],
    body: (values) => numbers(values, 'concentrationMolL', 'temperatureC', 'solventUsCm'),
  },
  {
    kind: 'reference',
    label: 'At reference temperature',
    sentence:
      'One measured value taken to its reference temperature by each model. Choose by the water, not by the result.',
    path: 'reference-temperature',
    fields: [
      { name: 'conductivityUsCm', label: 'Measured conductivity', unit: 'µS/cm', initial: '' },
      { ...TEMPERATURE, label: 'at', initial: '' },
      { name: 'coefficientPercentPerK', label: 'Linear coefficient', unit: '%/K', initial: '1.9' },
      { name: 'referenceC', label: 'Reference', unit: '°C', initial: '25' },
    ],
    body: (values) =>
      numbers(values, 'conductivityUsCm', 'temperatureC', 'coefficientPercentPerK', 'referenceC'),
  },
  {
    kind: 'units',
    label: 'Units',
    sentence: 'One conductivity or resistivity in every unit.',
    path: 'units',
    fields: [
      { name: 'value', label: 'Value', initial: '1000' },
      {
        name: 'unit',
        label: 'Unit',
        initial: 'uS/cm',
        options: [
          ['uS/cm', 'µS/cm'],
          ['mS/cm', 'mS/cm'],
          ['S/cm', 'S/cm'],
          ['uS/m', 'µS/m'],
          ['mS/m', 'mS/m'],
          ['S/m', 'S/m'],
          ['Mohm cm', 'MΩ·cm'],
          ['kohm cm', 'kΩ·cm'],
          ['ohm cm', 'Ω·cm'],
          ['ohm m', 'Ω·m'],
        ].map(([value = '', label = '']) => ({ value, label })),
      },
    ],
    body: (values) => ({ ...numbers(values, 'value'), unit: values['unit'] }),
  },
  {
    kind: 'concentration',
    label: 'Concentration',
    sentence: 'One KCl concentration on the molal, demal and molar bases.',
    path: 'concentration',
    fields: [
      { name: 'value', label: 'Concentration', initial: '0.01' },
      { name: 'from', label: 'Basis', initial: 'molal', options: BASES },
      { ...TEMPERATURE, hint: 'A litre changes with it.' },
    ],
    body: (values) => ({ ...numbers(values, 'value', 'temperatureC'), from: values['from'] }),
  },
  {
    kind: 'cell-constant',
    label: 'Cell constant',
    sentence: 'The cell constant from a conductance measured in a known solution.',
    path: 'cell-constant',
    fields: [
      {
        name: 'referenceUsCm',
        label: 'Conductivity of the solution',
        unit: 'µS/cm',
        hint: 'At the temperature of the reading.',
        initial: '1408.2',
      },
      { name: 'conductanceUs', label: 'Measured conductance', unit: 'µS', initial: '' },
      { name: 'leadResistanceOhm', label: 'Resistance of the leads', unit: 'Ω', initial: '0' },
      { name: 'solventUsCm', label: 'Blank of the water', unit: 'µS/cm', initial: '0' },
    ],
    body: (values) => numbers(values, 'referenceUsCm', 'conductanceUs', 'leadResistanceOhm', 'solventUsCm'),
  },
  {
    kind: 'plan',
    label: 'Planned comparison',
    sentence: 'Can this method decide this tolerance? Asked before anybody travels.',
    path: 'planned-comparison',
    fields: [
      ...SOLUTION,
      TEMPERATURE,
      { name: 'tolerancePercent', label: 'Tolerance', unit: '%', initial: '3' },
      { name: 'resolutionUsCm', label: 'Resolution', unit: 'µS/cm', initial: '0' },
      {
        name: 'rule',
        label: 'Decision rule',
        isWide: true,
        initial: 'guarded-u',
        options: decisionRules.map((value) => ({ value, label: DECISION_RULE_LABELS[value] })),
      },
      {
        name: 'temperatureStandardUncertaintyC',
        label: 'u of the temperature',
        unit: 'K',
        hint: 'Standard uncertainty.',
        initial: '0.05',
      },
      {
        name: 'repeatabilityPercent',
        label: 'Repeatability',
        unit: '%',
        hint: 'As a standard uncertainty.',
        initial: '0.1',
      },
    ],
    body: (values) => ({
      solution: solutionOf(values),
      ...numbers(
        values,
        'temperatureC',
        'tolerancePercent',
        'temperatureStandardUncertaintyC',
        'repeatabilityPercent',
        'resolutionUsCm',
      ),
      rule: values['rule'],
    }),
  },
];
