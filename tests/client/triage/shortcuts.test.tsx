import { render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { setShortcutsOn } from '#src/features/triage/shortcut-setting.ts';
import { useShortcuts } from '#src/features/triage/shortcuts.ts';

function Page({ onClaim, children }: { onClaim: () => void; children?: React.ReactNode }) {
  useShortcuts({ c: onClaim });
  return (
    <>
      <button type="button">Somewhere</button>
      <label>
        Reply
        <textarea />
      </label>
      {children}
    </>
  );
}

afterEach(() => setShortcutsOn(true));

describe('a single key', () => {
  it('acts from anywhere on the page', async () => {
    const onClaim = vi.fn();
    render(<Page onClaim={onClaim} />);
    await userEvent.click(screen.getByRole('button'));
    await userEvent.keyboard('c');
    expect(onClaim).toHaveBeenCalledOnce();
  });

  it('is only a letter while somebody types', async () => {
    const onClaim = vi.fn();
    render(<Page onClaim={onClaim} />);
    await userEvent.type(screen.getByLabelText('Reply'), 'can you call?');
    expect(screen.getByLabelText<HTMLTextAreaElement>('Reply').value).toBe('can you call?');
    expect(onClaim).not.toHaveBeenCalled();
  });

  it('leaves the browser its own commands', async () => {
    const onClaim = vi.fn();
    render(<Page onClaim={onClaim} />);
    await userEvent.keyboard('{Control>}c{/Control}');
    await userEvent.keyboard('{Meta>}c{/Meta}');
    expect(onClaim).not.toHaveBeenCalled();
  });

  it('does nothing behind an open dialog', async () => {
    const onClaim = vi.fn();
    render(
      <Page onClaim={onClaim}>
        <div role="dialog" aria-label="Close the flag" />
      </Page>,
    );
    await userEvent.keyboard('c');
    expect(onClaim).not.toHaveBeenCalled();
  });

  it('does nothing once it is switched off, and that is kept on the device', async () => {
    const onClaim = vi.fn();
    render(<Page onClaim={onClaim} />);
    setShortcutsOn(false);
    await userEvent.keyboard('c');
    expect(onClaim).not.toHaveBeenCalled();
    expect(Object.values({ ...localStorage })).toContain('off');
  });
});
