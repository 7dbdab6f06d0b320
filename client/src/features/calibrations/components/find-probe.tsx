import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';
import type { ProbeRow } from '../../../../../shared/contracts/probes.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { paths } from '../../../paths.ts';
import { probesByCode } from '../api.ts';
import { ScanPicture } from '../bench/identify-screen.tsx';
import { canScan, codeFromLabel } from '../bench/use-scanner.ts';

/** Scan the probe's label, or type its tag or serial. */
export function FindProbe() {
  const navigate = useNavigate();
  const [text, setText] = useState('');
  const [asked, setAsked] = useState('');
  const [isScanning, setIsScanning] = useState(false);
  const query = useQuery(probesByCode(asked));
  const found = query.data?.items.filter((probe) => probe.status !== 'retired') ?? [];
  const go = (probeId: number) => void navigate(paths.startCalibration.to({ probeId }));
  const exact = exactly(found, asked);
  const scanned = (label: string) => {
    const { probeId, code } = codeFromLabel(label);
    setIsScanning(false);
    if (probeId !== null) return go(probeId);
    setText(code);
    setAsked(code);
  };
  return (
    <form
      className="find-probe"
      onSubmit={(event) => {
        event.preventDefault();
        setAsked(text.trim());
        const known = exactly(found, text.trim());
        if (known) go(known.id);
      }}
    >
      {isScanning ? <ScanPicture onCode={scanned} onClose={() => setIsScanning(false)} /> : null}
      <Field label="Tag or serial of the probe" hint="As on its label: sk-21, or 2E-1183.">
        <TextInput
          value={text}
          maxLength={60}
          autoComplete="off"
          autoCapitalize="none"
          spellCheck={false}
          onChange={(event) => {
            setText(event.target.value);
            setAsked(event.target.value.trim());
          }}
        />
      </Field>
      <div className="flex gap-2">
        {canScan() ? (
          <Button kind="bench" onClick={() => setIsScanning(true)}>
            Scan its label
          </Button>
        ) : null}
        {exact ? (
          <Button kind="primary" onClick={() => go(exact.id)}>
            Calibrate {exact.tag}
          </Button>
        ) : null}
      </div>
      {asked.length >= 2 && query.data && !exact ? <Found probes={found} asked={asked} /> : null}
    </form>
  );
}

function exactly(probes: readonly ProbeRow[], text: string): ProbeRow | null {
  const code = text.toLowerCase();
  return (
    probes.find((probe) => probe.tag.toLowerCase() === code || probe.serial.toLowerCase() === code) ?? null
  );
}

function Found({ probes, asked }: { probes: readonly ProbeRow[]; asked: string }) {
  if (probes.length === 0) return <p role="status">No probe fits “{asked}” at the sites you may see.</p>;
  return (
    <ul aria-label="Probes that fit">
      {probes.slice(0, 6).map((probe) => (
        <li key={probe.id} className="border-b border-rule">
          <Link
            className="link flex min-h-12 items-center justify-between gap-4 font-mono"
            to={paths.startCalibration.to({ probeId: probe.id })}
          >
            {probe.tag}
            <small>
              {probe.serial}, {probe.placement?.pointName ?? 'not installed'}
            </small>
          </Link>
        </li>
      ))}
    </ul>
  );
}
