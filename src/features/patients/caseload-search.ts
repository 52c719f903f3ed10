import { useState } from 'react';
import { dropFromDevice, keepOnDevice, readFromDevice } from '#src/lib/device-store.ts';

const keptName = 'caseload-search';

/**
 * What somebody searches the caseload for is a patient's name: it stays on the screen, and in the tab's own storage
 * for the way to a record and back. It never stands in an address, which histories and logs keep.
 */
export function useCaseloadSearch(personId: string) {
  const keeper = { personId, recordId: null };
  const [search, setSearch] = useState(() => {
    const kept = readFromDevice({ ...keeper, onDevice: false }, keptName);
    return typeof kept === 'string' ? kept : '';
  });
  function keep(next: string) {
    if (next === '') dropFromDevice(keeper, keptName);
    else keepOnDevice({ ...keeper, onDevice: false }, keptName, next);
    setSearch(next);
  }
  return [search, keep] as const;
}
