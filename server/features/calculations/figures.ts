/** Pure: the science's functions, asked for what the bench needs, each answer with its equation, range, source and U. */
import type {
  Calculation,
  CellConstantFromReading,
  ConcentrationConversion,
  DiluteKcl,
  Figure,
  ReferenceValue,
  UnitConversion,
} from '../../../shared/contracts/calculations.ts';
import { cellConstant } from '../../../shared/science/cell-constant.ts';
import {
  lotLabel,
  lotReferenceConductivity,
  type CertifiedLot,
} from '../../../shared/science/certified-lots.ts';
import { convertConcentration } from '../../../shared/science/concentration.ts';
import { ScienceError } from '../../../shared/science/errors.ts';
import { diluteKclConductivity } from '../../../shared/science/kcl-solutions.ts';
import {
  kclStandardConductivity,
  kclStandardLabel,
  type KclBasis,
  type KclNominal,
} from '../../../shared/science/kcl-standards.ts';
import { onsagerMolarConductivity } from '../../../shared/science/onsager.ts';
import { onsagerValidity } from '../../../shared/science/onsager-validity.ts';
import { citation, type ReferenceKey } from '../../../shared/science/references.ts';
import {
  toReferenceTemperature,
  type CompensationModel,
} from '../../../shared/science/temperature-compensation.ts';
import {
  conductivityFromMolar,
  conductivityFromResistivity,
  conductivityUnits,
  convertConductivity,
  resistivityFromConductivity,
  resistivityUnits,
  type ConductivityUnit,
  type ResistivityUnit,
} from '../../../shared/science/units.ts';

/** Two standard uncertainties: about 95 % when every component is well known [GUM 6.3.3]. */
const coverageFactor = 2;
const exact = { expandedUncertainty: null, coverageFactor: null, note: null };

/** Keeps a refusal beside the figures; anything but a refusal of the science is a fault and goes on. */
function attempt(answer: Calculation, name: string, compute: () => Figure): void {
  try {
    answer.figures.push(compute());
  } catch (error) {
    if (!(error instanceof ScienceError)) throw error;
    answer.refusals.push({ name, why: error.message });
  }
}

export function figureOfBasis(given: {
  basis: KclBasis;
  nominal: KclNominal;
  solventUsCm: number;
  temperatureC: number;
}): Figure {
  const found = kclStandardConductivity(given);
  return {
    name: kclStandardLabel(given),
    value: found.conductivityUsCm,
    unit: 'µS/cm',
    expandedUncertainty: coverageFactor * found.relativeStandardUncertainty * found.conductivityUsCm,
    coverageFactor,
    equation: `KCl reference solution, ${given.basis} table`,
    range: '0 to 50 °C',
    source: citation(found.source),
    note:
      given.solventUsCm > 0
        ? `${given.solventUsCm} µS/cm of the water is added.`
        : 'The conductivity of the water is not in the table: add the measured blank.',
  };
}

export function figureOfLot(lot: CertifiedLot, temperatureC: number): Figure {
  const found = lotReferenceConductivity({ lot, temperatureC });
  return {
    name: lotLabel({ lot }),
    value: found.conductivityUsCm,
    unit: 'µS/cm',
    expandedUncertainty: coverageFactor * found.standardUncertaintyUsCm,
    coverageFactor,
    equation: `Reference solution lot, ${found.interpolation.replaceAll('-', ' ')}`,
    range: 'the certificate’s own temperatures',
    source: found.source,
    note: null,
  };
}

export function diluteFigures(given: DiluteKcl): Calculation {
  const answer: Calculation = { figures: [], refusals: [] };
  attempt(answer, 'Dilute KCl equation', () => {
    const found = diluteKclConductivity(given);
    return {
      name: 'Dilute KCl with the water’s blank',
      value: found.conductivityUsCm,
      unit: 'µS/cm',
      expandedUncertainty: coverageFactor * found.standardUncertaintyUsCm,
      coverageFactor,
      equation: found.model,
      range: '0 to 0.01 mol/L, 0 to 50 °C',
      source: citation(found.source),
      note: 'U is the equation’s; the concentration’s and the blank’s come on top.',
    };
  });
  attempt(answer, 'Limiting law', () => limitingLawFigure(given));
  return answer;
}

function limitingLawFigure({ concentrationMolL, temperatureC, solventUsCm }: DiluteKcl): Figure {
  const molarConductivity = onsagerMolarConductivity({ salt: 'KCl', concentrationMolL, temperatureC });
  const salt = conductivityFromMolar({ molarConductivity, concentrationMolL });
  const { validity, relativeStandardUncertainty } = onsagerValidity({ salt: 'KCl', concentrationMolL });
  return {
    name: 'Debye–Hückel–Onsager limiting law with the water’s blank',
    value: salt + solventUsCm,
    unit: 'µS/cm',
    expandedUncertainty: coverageFactor * relativeStandardUncertainty * salt,
    coverageFactor,
    equation: 'Λ = Λ° − (A + B Λ°) √c',
    range: '1:1 salts: to 1 mmol/L; doubtful to 5 mmol/L; refused above',
    source: citation('onsager-1927'),
    note: validity === 'doubtful' ? 'Above 1 mmol/L the law is doubtful: use the dilute KCl equation.' : null,
  };
}

export function referenceFigures(given: ReferenceValue): Calculation {
  const answer: Calculation = { figures: [], refusals: [] };
  const linear: CompensationModel = {
    kind: 'linear',
    coefficientPerK: given.coefficientPercentPerK / 100,
    referenceC: given.referenceC,
  };
  const models: {
    model: CompensationModel;
    name: string;
    equation: string;
    range: string;
    source: ReferenceKey;
    note: string | null;
  }[] = [
    {
      model: 'none',
      name: `As measured, at ${given.temperatureC} °C`,
      equation: 'none',
      range: 'any',
      source: 'bench-practice',
      note: 'Not a value at a reference temperature.',
    },
    {
      model: linear,
      name: `Linear ${given.coefficientPercentPerK} %/K, at ${given.referenceC} °C`,
      equation: 'κ / (1 + α (t − t_ref))',
      range: '−5 to 140 °C, 0 to 10 %/K',
      source: 'bench-practice',
      note: 'As good as its coefficient, which holds for one solution and one span of temperature.',
    },
    {
      model: 'natural-water',
      name: 'Natural waters, at 25 °C',
      equation: 'f₂₅(t) κ',
      range: '0 to 35.9 °C, natural waters of 60 to 1 000 µS/cm',
      source: 'iso-7888',
      note: null,
    },
    {
      model: 'ultrapure',
      name: 'Ultrapure water, at 25 °C',
      equation: 'water and salt compensated apart',
      range: '5 to 55 °C, near pure water',
      source: 'iapws-conductivity-1990',
      note: null,
    },
  ];
  for (const { model, name, equation, range, source, note } of models) {
    attempt(answer, name, () => ({
      ...exact,
      name,
      value: toReferenceTemperature({ ...given, model }),
      unit: 'µS/cm',
      equation,
      range,
      source: citation(source),
      note,
    }));
  }
  return answer;
}

const unitLabels: Record<string, string> = {
  'uS/cm': 'µS/cm',
  'uS/m': 'µS/m',
  'Mohm cm': 'MΩ·cm',
  'kohm cm': 'kΩ·cm',
  'ohm cm': 'Ω·cm',
  'ohm m': 'Ω·m',
};

export function unitFigures({ value, unit }: UnitConversion): Calculation {
  const isConductivity = (conductivityUnits as string[]).includes(unit);
  const conductivityUsCm = isConductivity
    ? convertConductivity({ value, from: unit as ConductivityUnit, to: 'uS/cm' })
    : conductivityFromResistivity({ resistivity: value, unit: unit as ResistivityUnit });
  const common = { ...exact, range: 'any positive value', source: 'International System of Units (SI)' };
  return {
    figures: [
      ...conductivityUnits.map((to) => ({
        ...common,
        name: 'Conductivity',
        value: convertConductivity({ value: conductivityUsCm, from: 'uS/cm', to }),
        unit: unitLabels[to] ?? to,
        equation: 'unit conversion',
      })),
      ...resistivityUnits.map((to) => ({
        ...common,
        name: 'Resistivity',
        value: resistivityFromConductivity({ conductivityUsCm, unit: to }),
        unit: unitLabels[to] ?? to,
        equation: '1/κ',
      })),
    ],
    refusals: [],
  };
}

const basisUnits = { molal: 'mol/kg of water', demal: 'demal', molar: 'mol/L' } as const;

export function concentrationFigures(given: ConcentrationConversion): Calculation {
  const answer: Calculation = { figures: [], refusals: [] };
  for (const to of ['molal', 'demal', 'molar'] as const) {
    const name = to === 'molar' ? `molar, litre at ${given.temperatureC} °C` : to;
    attempt(answer, name, () => ({
      name,
      value: convertConcentration({ ...given, to }),
      unit: basisUnits[to],
      expandedUncertainty: null,
      coverageFactor: null,
      equation: 'c = w ρ / M;  m = 1000 w / (M (1 − w))',
      range: 'KCl in water, to 1.1, 0 to 95 °C',
      source: citation('laliberte-2009'),
      note: to === given.from ? 'As given.' : '0.02 % from the density of the solution.',
    }));
  }
  return answer;
}

export function cellConstantFigures(given: CellConstantFromReading): Calculation {
  const answer: Calculation = { figures: [], refusals: [] };
  const common = {
    ...exact,
    unit: 'cm⁻¹',
    range: '0.001 to 100 cm⁻¹',
    source: 'Definition of the cell constant',
  };
  attempt(answer, 'Cell constant', () => ({
    ...common,
    name: 'Cell constant',
    value: cellConstant(given),
    equation: 'K = κ_ref R,  R = 1/G − R_leads',
    note: 'Exact arithmetic: its U is that of the solution, the temperature and the conductance.',
  }));
  return answer;
}
