import { LoadingFace } from '../../../components/ui/faces.tsx';

/** The shape of a probe page: head, strip, charts beside events. */
export function ProbeLoading() {
  return (
    <>
      <LoadingFace label="Fetching the probe" rows={1} rowHeight={180} />
      <LoadingFace label="Fetching its last comparison" rows={1} rowHeight={108} />
      <div className="probe-columns mt-6">
        <LoadingFace label="Fetching its readings" rows={1} rowHeight={300} />
        <LoadingFace label="Fetching its events" rows={5} rowHeight={64} />
      </div>
    </>
  );
}
