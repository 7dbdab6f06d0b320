import { useState } from 'react';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { TextInput } from '../../../components/ui/text-input.tsx';
import { useBench } from './bench-context.ts';
import { BenchFoot } from './bench-foot.tsx';
import { RefusedDeeds } from './refused-deeds.tsx';
import { canScan, codeFromLabel, useScanner } from './use-scanner.ts';

/** Twin tags are the usual way to calibrate the wrong probe: the serial on its body decides. */
export function IdentifyScreen() {
  const { view, finish } = useBench();
  const run = view.calibration;
  const [isScanning, setIsScanning] = useState(false);
  const [serial, setSerial] = useState('');
  const [by, setBy] = useState<'scan' | 'typed'>('typed');
  const read = serial.trim();
  const isSame = isSameSerial(read, run.probeSerial);
  const found = (text: string) => {
    const { probeId, code } = codeFromLabel(text);
    setIsScanning(false);
    setBy('scan');
    setSerial(probeId === run.probeId ? run.probeSerial : code);
  };
  return (
    <>
      <p className="bench-say">
        {run.plan.sentence}
        {run.plan.canDecide ? '' : ' You may go on: the record will say so.'}
      </p>
      <h2 className="bench-question">Is this the right probe?</h2>
      <p className="bench-note">
        The record expects serial <b>{run.probeSerial}</b>, {run.probeTag}, with a cell constant of{' '}
        {formatNumber(run.cellConstantBeforePerCm, { significantDigits: 5 })} cm⁻¹ in the transmitter.
      </p>
      {isScanning ? <ScanPicture onCode={found} onClose={() => setIsScanning(false)} /> : null}
      <div className="bench-fields">
        <Field
          label="Serial on the probe’s body"
          error={
            read.length >= run.probeSerial.length && !isSame
              ? `This is not ${run.probeSerial}. Stop here and fetch the right probe.`
              : null
          }
        >
          <TextInput
            value={serial}
            autoComplete="off"
            autoCapitalize="characters"
            spellCheck={false}
            maxLength={60}
            onChange={(event) => {
              setBy('typed');
              setSerial(event.target.value);
            }}
          />
        </Field>
      </div>
      {canScan() && !isScanning ? (
        <button type="button" className="bench-second" onClick={() => setIsScanning(true)}>
          Scan its code instead
        </button>
      ) : null}
      <RefusedDeeds />
      <BenchFoot>
        <Button
          kind="primary"
          disabled={!isSame}
          onClick={() => finish({ step: 'identify', by, serial: read, cellConstantPerCm: null })}
        >
          {isSame ? 'It is this probe' : 'Scan or type the serial'}
        </Button>
      </BenchFoot>
    </>
  );
}

function isSameSerial(read: string, expected: string): boolean {
  return read.toLowerCase() === expected.toLowerCase();
}

/** The camera’s picture while it looks for a code. */
export function ScanPicture({ onCode, onClose }: { onCode: (code: string) => void; onClose: () => void }) {
  const { video, refusal } = useScanner(onCode);
  return (
    <div>
      <video ref={video} className="scan-picture" muted playsInline aria-label="Camera, looking for a code" />
      {refusal ? <p className="field-error">{refusal}</p> : null}
      <button type="button" className="bench-second" onClick={onClose}>
        Close the camera
      </button>
    </div>
  );
}
