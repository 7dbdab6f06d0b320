import { useQuery } from '@tanstack/react-query';
import { UnknownAddress } from '../components/layout/unknown-address.tsx';
import { Answer } from '../components/ui/answer.tsx';
import { LoadingFace } from '../components/ui/faces.tsx';
import { quarantinedDetail } from '../features/quarantine/api.ts';
import { MessageView } from '../features/quarantine/components/message-view.tsx';
import { paths } from '../paths.ts';
import { SettingsTabs } from './settings-tabs.tsx';
import { useIdParam } from './use-id-param.ts';

export default function QuarantinedMessagePage() {
  const id = useIdParam('id');
  const query = useQuery({ ...quarantinedDetail(id ?? 0), enabled: id !== null });
  const unknown = <UnknownAddress home={paths.quarantine.to()} />;
  if (id === null) return unknown;
  return (
    <>
      <SettingsTabs />
      <Answer
        query={query}
        what="the message"
        loading={<LoadingFace label="Fetching the message" />}
        missing={unknown}
      >
        {(message) => <MessageView key={message.id} message={message} />}
      </Answer>
    </>
  );
}
