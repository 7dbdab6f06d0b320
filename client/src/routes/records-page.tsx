import { Navigate } from 'react-router-dom';
import { paths } from '../paths.ts';

/** The records begin with the trail of everything that was done. */
export default function RecordsPage() {
  return <Navigate replace to={paths.auditTrail.to()} />;
}
