import { useQuery } from '@tanstack/react-query';
import { useCallback, useMemo } from 'react';
import { useSearchParams } from 'react-router-dom';
import { ButtonLink } from '../components/ui/button.tsx';
import { ProbeList } from '../features/probes/components/probe-list.tsx';
import { filtersFrom } from '../features/probes/filters.ts';
import { useSession } from '../features/sessions/session-context.ts';
import { sitesList } from '../features/sites/api.ts';
import { useShowSite } from '../features/sites/site-in-view.ts';
import { paths } from '../paths.ts';

/** The list of probes; its filters stand in the address, so that a view can be sent to somebody. */
export default function ProbesPage() {
  const [params, setParams] = useSearchParams();
  const filters = useMemo(() => filtersFrom(params), [params]);
  const sites = useQuery(sitesList()).data?.items ?? [];
  const { can } = useSession();
  useShowSite(filters.siteId ?? null);
  const setFilter = useCallback(
    (name: string, value: string) =>
      setParams(
        (before) => {
          const after = new URLSearchParams(before);
          if (value) after.set(name, value);
          else after.delete(name);
          return after;
        },
        { replace: true },
      ),
    [setParams],
  );
  return (
    <ProbeList
      filters={filters}
      sites={sites}
      onFilter={setFilter}
      onClear={() => setParams({}, { replace: true })}
      register={
        can.registerProbe ? (
          <ButtonLink kind="primary" to={paths.newProbe.to({ siteId: filters.siteId })}>
            Register a probe
          </ButtonLink>
        ) : null
      }
    />
  );
}
