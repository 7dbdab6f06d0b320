import { useState } from 'react';
import type { IssuedCredentials } from '../../../../../shared/contracts/devices.ts';
import type { DeviceSummary } from '../../../../../shared/contracts/probes.ts';
import { formatDuration } from '../../../../../shared/format/dates.ts';
import { formatNumber } from '../../../../../shared/format/numbers.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ConfirmDialog } from '../../../components/ui/confirm-dialog.tsx';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { SectionTitle } from '../../../components/ui/page-head.tsx';
import { Age, Time } from '../../../components/ui/time.tsx';
import { useToast } from '../../../components/ui/toast.tsx';
import { useReplaceCredentials, useRevokeCredentials } from '../api.ts';
import { CredentialsDialog } from './credentials-dialog.tsx';
import { IssueCredentialsDialog } from './issue-credentials-dialog.tsx';

export interface DeviceSectionProps {
  probe: { id: number; tag: string };
  device: DeviceSummary | null;
  can: { issueCredentials: boolean; revokeCredentials: boolean };
  timeZone: string;
}

/** The device that speaks for a probe: whether it is there, what it says of itself, and its credentials. */
export function DeviceSection({ probe, device, can, timeZone }: DeviceSectionProps) {
  const [step, setStep] = useState<'issue' | 'replace' | 'revoke' | null>(null);
  const [issued, setIssued] = useState<IssuedCredentials | null>(null);
  const close = () => setStep(null);
  return (
    <section>
      <SectionTitle>Device</SectionTitle>
      {device ? (
        <DeviceFacts device={device} timeZone={timeZone} />
      ) : (
        <p className="text-ink-2">
          No device may report for this probe yet. Issue credentials and enter them in its transmitter or
          gateway.
        </p>
      )}
      <div className="form-actions mt-4">
        {can.issueCredentials ? (
          <Button kind="primary" onClick={() => setStep('issue')}>
            Issue device credentials…
          </Button>
        ) : null}
        {device && can.revokeCredentials ? (
          <>
            <Button onClick={() => setStep('replace')}>Replace password…</Button>
            <Button kind="danger" onClick={() => setStep('revoke')}>
              Withdraw credentials…
            </Button>
          </>
        ) : null}
      </div>
      {step === 'issue' ? (
        <IssueCredentialsDialog probe={probe} onClose={close} onIssued={setIssued} />
      ) : null}
      {device && step === 'replace' ? (
        <ReplaceDialog device={device} onClose={close} onIssued={setIssued} />
      ) : null}
      {device && step === 'revoke' ? <RevokeDialog device={device} onClose={close} /> : null}
      {issued ? <CredentialsDialog issued={issued} onClose={() => setIssued(null)} /> : null}
    </section>
  );
}

function DeviceFacts({ device, timeZone }: { device: DeviceSummary; timeZone: string }) {
  return (
    <DefinitionList
      items={[
        { term: 'Name', value: device.name },
        { term: 'Connection', value: connectionWords(device) },
        { term: 'Last message', value: <Age at={device.lastSeenAt} timeZone={timeZone} /> },
        { term: 'Sends every', value: formatNumber(device.readingIntervalS, { unit: 's' }) },
        { term: 'Firmware', value: device.firmware },
        {
          term: 'Cell constant it uses',
          value: formatNumber(device.reportedCellConstantPerCm, { decimals: 4, unit: 'cm⁻¹' }),
        },
        { term: 'Settings', value: device.settingsHash?.slice(0, 23) },
        { term: 'Clock', value: clockWords(device.clockOffsetMs) },
        { term: 'Sent twice', value: formatNumber(device.duplicateCount, { decimals: 0 }) },
        { term: 'Credentials since', value: <Time at={device.credentialsIssuedAt} timeZone={timeZone} /> },
      ]}
    />
  );
}

function connectionWords({ isOnline, onlineWhy }: DeviceSummary): string {
  if (isOnline) return 'connected';
  return onlineWhy === 'planned' ? 'away, as planned' : 'not connected';
}

/** Below a second no reading is put in the wrong place. */
function clockWords(offsetMs: number | null): string {
  if (offsetMs === null) return 'not stated';
  if (Math.abs(offsetMs) < 1000) return 'right to the second';
  return `${formatDuration(Math.abs(offsetMs) / 1000)} ${offsetMs > 0 ? 'behind' : 'ahead'}`;
}

interface DeviceDialogProps {
  device: DeviceSummary;
  onClose: () => void;
}

function ReplaceDialog({
  device,
  onClose,
  onIssued,
}: DeviceDialogProps & { onIssued: (issued: IssuedCredentials) => void }) {
  const replace = useReplaceCredentials(device.id);
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={`Replace the password of ${device.name}?`}
      sentence="The old one stops working at once, and the device is silent until the new one is entered there."
      confirmLabel="Replace password"
      asksReason
      onConfirm={async (reason) => onIssued(await replace.mutateAsync(reason))}
    />
  );
}

function RevokeDialog({ device, onClose }: DeviceDialogProps) {
  const revoke = useRevokeCredentials(device.id);
  const say = useToast();
  return (
    <ConfirmDialog
      isOpen
      onClose={onClose}
      title={`Withdraw the credentials of ${device.name}?`}
      sentence="It is disconnected at once and cannot sign in again. What it sent stays."
      confirmLabel="Withdraw credentials"
      isDanger
      asksReason
      onConfirm={async (reason) => {
        await revoke.mutateAsync(reason);
        say(`The credentials of ${device.name} are withdrawn.`);
      }}
    />
  );
}
