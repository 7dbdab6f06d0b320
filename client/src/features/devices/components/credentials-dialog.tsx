import type { IssuedCredentials } from '../../../../../shared/contracts/devices.ts';
import { Button } from '../../../components/ui/button.tsx';
import { CopyOnce } from '../../../components/ui/copy-once.tsx';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { Dialog } from '../../../components/ui/dialog.tsx';

/** The password of a device, this once; closed only by saying that it is stored. */
export function CredentialsDialog({ issued, onClose }: { issued: IssuedCredentials; onClose: () => void }) {
  return (
    <Dialog
      isOpen
      isLocked
      isWide
      onClose={onClose}
      title={`Credentials of ${issued.username}`}
      sentence="Enter these in the transmitter or gateway. Only a hash of the password is kept here."
      actions={
        <Button kind="primary" onClick={onClose}>
          I have stored it
        </Button>
      }
    >
      <CopyOnce label={`Password of device ${issued.username}`} secret={issued.password} />
      <DefinitionList
        items={[
          { term: 'User name', value: issued.username },
          { term: 'Broker', value: issued.brokerUrl },
          { term: 'Topics begin with', value: issued.topicPrefix },
          { term: 'Quality of service', value: '1, each message acknowledged once it is stored' },
        ]}
      />
    </Dialog>
  );
}
