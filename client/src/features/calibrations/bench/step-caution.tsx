import type { HazardTag, RunStep } from '../../../../../shared/contracts/vocabulary.ts';
import { HAZARD_CAUTIONS } from '../../../../../shared/format/cautions.ts';

/** The hazards that matter at a step; all of them stand in full before the run begins. */
const HAZARDS_AT: Readonly<Partial<Record<RunStep, readonly HazardTag[]>>> = {
  hold: ['control-loop'],
  'as-found-process': ['hot-process', 'pressurised', 'confined-space'],
  'as-found': ['hot-process', 'pressurised', 'electrical', 'chemicals'],
  clean: ['hypochlorite', 'chemicals', 'biosecurity'],
  'zero-in-air': ['electrical', 'chemicals'],
  'as-found-cleaned': ['hypochlorite', 'chemicals'],
  'second-point': ['chemicals'],
  'temperature-sensor': ['hot-process'],
  'as-left': ['chemicals'],
  reinstall: ['pressurised', 'hygiene', 'biosecurity', 'control-loop'],
};
/** More than two are not read at a glance. */
const AT_ONCE = 2;

/** One line of caution at the step that needs it. */
export function StepCaution({ step, tags }: { step: RunStep; tags: readonly HazardTag[] }) {
  const fitting = (HAZARDS_AT[step] ?? []).filter((tag) => tags.includes(tag)).slice(0, AT_ONCE);
  if (fitting.length === 0) return null;
  return (
    <div className="caution bench-caution" role="note">
      <svg width="22" height="20" viewBox="0 0 22 20" aria-hidden="true">
        <path d="M2 2V18M20 2V18M2 10H20" stroke="currentColor" strokeWidth="2.5" />
      </svg>
      <p>
        {fitting.map((tag) => firstSentence(HAZARD_CAUTIONS[tag].text)).join(' ')} Site rules and permits come
        first.
      </p>
    </div>
  );
}

function firstSentence(text: string): string {
  return /^[^.;]+[.;]/.exec(text)?.[0].replace(/;$/, '.') ?? text;
}
