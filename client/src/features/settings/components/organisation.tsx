import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { Setting } from '../../../../../shared/contracts/settings.ts';
import { formatDateTime } from '../../../../../shared/format/dates.ts';
import { Answer } from '../../../components/ui/answer.tsx';
import { Button } from '../../../components/ui/button.tsx';
import { DefinitionList } from '../../../components/ui/definition-list.tsx';
import { LoadingFace } from '../../../components/ui/faces.tsx';
import { PageHead, SectionTitle } from '../../../components/ui/page-head.tsx';
import { settingsList } from '../api.ts';
import type { SettingGroup } from '../model.ts';
import { draftOf, SETTING_GROUPS, valueText } from '../model.ts';
import { ChangeSettingDialog } from './change-setting-dialog.tsx';

/** The few values that hold for the whole organisation. */
export function Organisation() {
  const query = useQuery(settingsList());
  const mayChange = query.data?.items.some((setting) => setting.can.change) ?? false;
  return (
    <>
      <PageHead
        name="Organisation"
        sentence={
          <>
            These values hold at every site. Tolerances, rules and intervals belong to the measuring points.{' '}
            {query.data && !mayChange ? <b>An administrator of all sites changes them.</b> : null}
          </>
        }
      />
      <Answer
        query={query}
        what="the settings"
        loading={<LoadingFace label="Fetching the settings" rows={8} rowHeight={40} />}
      >
        {({ items }) => (
          <div className="setting-groups">
            {SETTING_GROUPS.map((group) => {
              const setting = items.find((one) => one.key === group.key);
              return setting ? <Group key={group.key} group={group} setting={setting} /> : null;
            })}
          </div>
        )}
      </Answer>
    </>
  );
}

function Group({ group, setting }: { group: SettingGroup; setting: Setting }) {
  const [isChanging, setIsChanging] = useState(false);
  const draft = draftOf(group, setting);
  return (
    <section>
      <SectionTitle note={group.note}>{group.title}</SectionTitle>
      <DefinitionList
        items={[
          ...group.fields.map((field) => ({
            term: field.label,
            value: (
              <>
                {valueText(field, draft[field.name])}
                <small className="definition-note">{field.hint}</small>
              </>
            ),
          })),
          {
            term: 'Changed last',
            value: setting.updatedAt
              ? formatDateTime(setting.updatedAt, { offset: true })
              : 'never, as delivered',
          },
        ]}
      />
      {setting.can.change ? (
        <div className="mt-4">
          <Button aria-label={`Change ${group.title}`} onClick={() => setIsChanging(true)}>
            Change…
          </Button>
        </div>
      ) : null}
      {isChanging ? (
        <ChangeSettingDialog group={group} setting={setting} onClose={() => setIsChanging(false)} />
      ) : null}
    </section>
  );
}
