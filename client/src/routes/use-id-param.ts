import { useParams } from 'react-router-dom';

/** The identity in the address; null when what stands there is none. */
export function useIdParam(name: string): number | null {
  const text = useParams()[name] ?? '';
  return /^[1-9]\d{0,9}$/.test(text) ? Number(text) : null;
}
