import { createContext, useContext } from 'react';
import type { StepData } from '../../../../../shared/contracts/calibrations.ts';
import type { Deed } from '../offline/deeds.ts';
import type { RunView } from '../offline/run-state.ts';

export interface BenchParts {
  view: RunView;
  userId: number;
  /** Of the site, for every time on the bench. */
  timeZone: string;
  isOnline: boolean;
  /** Saves a deed on this phone; sending follows by itself. */
  add: (deed: Deed) => Promise<void>;
  /** Finishes the current step with what it recorded. */
  finish: (data: StepData) => Promise<void>;
}

export const BenchContext = createContext<BenchParts | null>(null);

export function useBench(): BenchParts {
  const parts = useContext(BenchContext);
  if (!parts) throw new Error('This part stands on the bench only.');
  return parts;
}
