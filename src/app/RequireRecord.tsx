import { useState, useSyncExternalStore } from 'react';
import { Navigate, Outlet, useLocation } from 'react-router-dom';
import { CaringLine } from './CaringLine.tsx';
import { useIsScreenHeld } from './caution-hold.ts';
import { RecordContext } from './caring.ts';
import { chosenRecordId, recordChosen, recordOf } from './record-choice.ts';
import { useMe } from './session.tsx';

/**
 * Lets through where it is known whose record the screens are about, and names them where it is somebody else's.
 * Another record is another screen: nothing that the one before had on it stays.
 */
export function RequireRecord() {
  const me = useMe();
  const { pathname, search } = useLocation();
  const held = useIsScreenHeld();
  const chosen = useSyncExternalStore(recordChosen.subscribe, () => chosenRecordId(me.personId));
  const [last, setLast] = useState(() => ({ me, chosen, record: recordOf(me) }));
  if (last.me !== me || last.chosen !== chosen) {
    // Whoever is told to call an ambulance keeps that on the screen, also when the care ends this minute.
    setLast({ me, chosen, record: recordOf(me) ?? (held ? last.record : null) });
  }
  const { record } = last;
  if (!record) return <Navigate to={`/caring?then=${encodeURIComponent(pathname + search)}`} replace />;
  return (
    <RecordContext key={record.id} value={record}>
      {record.caring ? <CaringLine name={record.caring.name} /> : null}
      <Outlet />
    </RecordContext>
  );
}
