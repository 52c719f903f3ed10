import { beforeEach, describe, expect, it } from 'vitest';
import {
  clearDeviceStore,
  dropFromDevice,
  keepOnDevice,
  readFromDevice,
  recordsKept,
} from '#src/lib/device-store.ts';

const ines = { personId: 'ines', recordId: null, onDevice: true };
const inesForNow = { ...ines, onDevice: false };
const inesForMarta = { ...ines, recordId: 'record-of-marta' };
const wendell = { ...ines, personId: 'wendell' };

beforeEach(() => {
  localStorage.clear();
  sessionStorage.clear();
});

describe('health data on the device', () => {
  it('outlives the tab only where the person chose to stay signed in', () => {
    keepOnDevice(inesForNow, 'check-in', { painNow: 3 });
    expect(localStorage).toHaveLength(0);
    keepOnDevice(ines, 'check-in', { painNow: 4 });
    sessionStorage.clear();
    expect(readFromDevice(ines, 'check-in')).toEqual({ painNow: 4 });
  });

  it('is never shown to another person', () => {
    keepOnDevice(ines, 'check-in', { painNow: 3 });
    expect(readFromDevice(wendell, 'check-in')).toBeNull();
  });

  it('goes when it was sent', () => {
    keepOnDevice(ines, 'check-in', { painNow: 3 });
    dropFromDevice(ines, 'check-in');
    expect(readFromDevice(ines, 'check-in')).toBeNull();
  });

  it('stands apart for each record that the same person fills in', () => {
    keepOnDevice(inesForMarta, 'check-in', { painNow: 7 });
    expect(readFromDevice(ines, 'check-in')).toBeNull();
    keepOnDevice(ines, 'check-in', { painNow: 2 });
    expect(readFromDevice(inesForMarta, 'check-in')).toEqual({ painNow: 7 });
    dropFromDevice(inesForMarta, 'check-in');
    expect(readFromDevice(ines, 'check-in')).toEqual({ painNow: 2 });
  });

  it('tells about which records something is kept, of this person only and only where it may be read', () => {
    keepOnDevice(inesForMarta, 'alerts', [1]);
    keepOnDevice({ ...inesForNow }, 'alerts', [2]);
    keepOnDevice(ines, 'draft:new-thread/text', 'text');
    keepOnDevice({ ...wendell, recordId: 'record-of-hana' }, 'alerts', [3]);
    expect(recordsKept(ines, ['alerts'])).toEqual([null, 'record-of-marta']);
    expect(recordsKept(inesForNow, ['alerts'])).toEqual([null]);
    expect(recordsKept(ines, ['check-in'])).toEqual([]);
  });

  it('goes whole at sign-out, and with it what else this site kept here', () => {
    localStorage.setItem('espalier-controls:ines', 'left');
    keepOnDevice(ines, 'check-in', { painNow: 3 });
    keepOnDevice(inesForNow, 'draft', 'text');
    clearDeviceStore();
    expect(localStorage).toHaveLength(0);
    expect(sessionStorage).toHaveLength(0);
  });

  it('is nothing, and no failure, where it cannot be read', () => {
    localStorage.setItem('espalier-data:ines:check-in', '{broken');
    expect(readFromDevice(ines, 'check-in')).toBeNull();
  });
});
