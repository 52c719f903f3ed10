import { act, render, renderHook, screen } from '@testing-library/react';
import { beforeAll, describe, expect, it } from 'vitest';
import { UpdateBanner } from '#src/app/UpdateBanner.tsx';
import { buildAnnounced } from '#src/lib/api.ts';
import { useBusyWhile } from '#src/lib/busy.ts';
import { startI18n } from '#src/lib/i18n.ts';

const banner = () => screen.queryByText('Espalier was updated.');

beforeAll(startI18n);

describe('after an update of the server', () => {
  it('an old tab is told to reload', () => {
    render(<UpdateBanner />);
    expect(banner()).toBeNull();
    act(() => buildAnnounced.emit('newer'));
    expect(banner()).not.toBeNull();
  });

  it('but never in mid-form: the banner waits until everything that was begun is done', () => {
    const checkIn = renderHook(({ begun }) => useBusyWhile(begun), { initialProps: { begun: true } });
    const message = renderHook(() => useBusyWhile(true));
    render(<UpdateBanner />);
    act(() => buildAnnounced.emit('newer'));
    expect(banner()).toBeNull();
    checkIn.rerender({ begun: false });
    expect(banner()).toBeNull();
    message.unmount();
    expect(banner()).not.toBeNull();
  });

  it('and what is begun afterwards takes it away again', () => {
    render(<UpdateBanner />);
    act(() => buildAnnounced.emit('newer'));
    expect(banner()).not.toBeNull();
    renderHook(() => useBusyWhile(true));
    expect(banner()).toBeNull();
  });
});
