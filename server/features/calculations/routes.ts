import {
  calculation,
  cellConstantFromReading,
  concentrationConversion,
  diluteKcl,
  plannedAnswer,
  plannedComparison,
  referenceValue,
  standardConductivity,
  unitConversion,
} from '../../../shared/contracts/calculations.ts';
import { route, type AnyRoute } from '../../http/route.ts';
import {
  cellConstantFigures,
  concentrationFigures,
  diluteFigures,
  referenceFigures,
  unitFigures,
} from './figures.ts';
import { planComparison, refusingByScience, standardFigures } from './service.ts';

const common = { verb: 'post', access: 'session', answer: calculation } as const;

export const calculationRoutes: AnyRoute[] = [
  route({
    ...common,
    path: '/api/calculations/standard-conductivity',
    does: 'Conductivity of a KCl reference solution or a lot at a temperature.',
    body: standardConductivity,
    run: ({ body }) => standardFigures(body),
  }),
  route({
    ...common,
    path: '/api/calculations/dilute-kcl',
    does: 'Dilute KCl at a temperature with the measured blank of the water.',
    body: diluteKcl,
    run: async ({ body }) => diluteFigures(body),
  }),
  route({
    ...common,
    path: '/api/calculations/reference-temperature',
    does: 'Value at the reference temperature by each model, side by side.',
    body: referenceValue,
    run: async ({ body }) => referenceFigures(body),
  }),
  route({
    ...common,
    path: '/api/calculations/units',
    does: 'One conductivity or resistivity in every unit.',
    body: unitConversion,
    run: async ({ body }) => refusingByScience(() => unitFigures(body)),
  }),
  route({
    ...common,
    path: '/api/calculations/concentration',
    does: 'A KCl concentration on the molal, demal and molar bases.',
    body: concentrationConversion,
    run: async ({ body }) => concentrationFigures(body),
  }),
  route({
    ...common,
    path: '/api/calculations/cell-constant',
    does: 'Cell constant from a conductance in a known solution.',
    body: cellConstantFromReading,
    run: async ({ body }) => cellConstantFigures(body),
  }),
  route({
    verb: 'post',
    access: 'session',
    path: '/api/calculations/planned-comparison',
    does: 'Says whether a planned comparison can decide a tolerance, and its uncertainty budget.',
    body: plannedComparison,
    answer: plannedAnswer,
    run: ({ body }) => planComparison(body),
  }),
];
