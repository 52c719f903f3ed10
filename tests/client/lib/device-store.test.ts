import { beforeEach, describe, expect, it } from 'vitest';
import { clearDeviceStore, dropFromDevice, keepOnDevice, readFromDevice } from '#src/lib/device-store.ts';

const ines = { personId: 'ines', onDevice: true };
const inesForNow = { personId: 'ines', onDevice: false };
const wendell = { personId: 'wendell', onDevice: true };

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
    dropFromDevice('ines', 'check-in');
    expect(readFromDevice(ines, 'check-in')).toBeNull();
  });

  it('goes whole at sign-out, and the settings of the device stay', () => {
    localStorage.setItem('espalier-controls:ines', 'left');
    keepOnDevice(ines, 'check-in', { painNow: 3 });
    keepOnDevice(inesForNow, 'draft', 'text');
    clearDeviceStore();
    expect(Object.keys(localStorage)).toEqual(['espalier-controls:ines']);
    expect(sessionStorage).toHaveLength(0);
  });

  it('is nothing, and no failure, where it cannot be read', () => {
    localStorage.setItem('espalier-data:ines:check-in', '{broken');
    expect(readFromDevice(ines, 'check-in')).toBeNull();
  });
});
