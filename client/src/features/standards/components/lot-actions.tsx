import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { Standard } from '../../../../../shared/contracts/standards.ts';
import type { StandardState } from '../../../../../shared/contracts/vocabulary.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { refetchOnConflict } from '../../../lib/refetch-on-conflict.ts';
import { standardDetail, useChangeStandardState } from '../api.ts';

interface Step {
  button: string;
  title: (code: string) => string;
  sentence: string;
  reasonHint: string;
  done: (code: string) => string;
  isDanger: boolean;
}

const STEPS: Readonly<Record<StandardState, Step>> = {
  released: {
    button: 'Release for use…',
    title: (code) => `Release ${code} for use?`,
    sentence: 'Comparisons with it count from now on, up to its last day.',
    reasonHint:
      'What was checked: the certificate against the delivery, the seals, a comparison with another lot.',
    done: (code) => `${code} is released for use.`,
    isDanger: false,
  },
  quarantined: {
    button: 'Put in quarantine…',
    title: (code) => `Put ${code} in quarantine?`,
    sentence:
      'Comparisons with it are kept and do not count until it is released again. Earlier ones stay as they are.',
    reasonHint: 'What is in doubt.',
    done: (code) => `${code} is in quarantine.`,
    isDanger: false,
  },
  recalled: {
    button: 'Recall…',
    title: (code) => `Recall ${code}?`,
    sentence:
      'It is never used again, and every comparison made with it is listed on this page so that it can be judged anew. This cannot be undone.',
    reasonHint: 'Who recalled it and why.',
    done: (code) => `${code} is recalled. Judge the comparisons made with it.`,
    isDanger: true,
  },
};

/** What may be done about the state of a lot. */
export function LotActions({ lot }: { lot: Standard }) {
  const [next, setNext] = useState<StandardState | null>(null);
  const offered: [StandardState, boolean][] = [
    ['released', lot.can.release],
    ['quarantined', lot.can.quarantine],
    ['recalled', lot.can.recall],
  ];
  return (
    <div className="page-buttons">
      {offered
        .filter(([, isAllowed]) => isAllowed)
        .map(([state]) => (
          <Button
            key={state}
            kind={STEPS[state].isDanger ? 'danger' : 'plain'}
            onClick={() => setNext(state)}
          >
            {STEPS[state].button}
          </Button>
        ))}
      {next ? <StateDialog lot={lot} state={next} onClose={() => setNext(null)} /> : null}
    </div>
  );
}

interface StateDialogProps {
  lot: Standard;
  state: StandardState;
  onClose: () => void;
}

function StateDialog({ lot, state, onClose }: StateDialogProps) {
  const change = useChangeStandardState(lot.id);
  const queryClient = useQueryClient();
  const say = useToast();
  const step = STEPS[state];
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={step.title(lot.code)}
      sentence={step.sentence}
      confirmLabel={step.button.replace('…', '')}
      isDanger={step.isDanger}
      asksReason
      reasonHint={step.reasonHint}
      onConfirm={async (reason) => {
        await refetchOnConflict(
          () => change.mutateAsync({ state, reason, version: lot.version }),
          () => queryClient.refetchQueries({ queryKey: standardDetail(lot.id).queryKey }),
        );
        say(step.done(lot.code));
      }}
    />
  );
}
