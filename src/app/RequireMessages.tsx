import { Navigate, Outlet } from 'react-router-dom';
import { useRecord } from './caring.ts';

/** The messages are there for whom the patient lets read them; to others Today says who does. */
export function RequireMessages() {
  return useRecord().caring?.mayMessage === false ? <Navigate to="/today" replace /> : <Outlet />;
}
