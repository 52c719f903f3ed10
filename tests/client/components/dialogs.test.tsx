import { render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { expect, test, vi } from 'vitest';
import { AlertDialog } from '#src/components/AlertDialog.tsx';
import { Button } from '#src/components/Button.tsx';
import { Dialog } from '#src/components/Dialog.tsx';
import { DropdownMenu } from '#src/components/DropdownMenu.tsx';

function Closing() {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button onClick={() => setOpen(true)}>Close the flag</Button>
      <Dialog
        open={open}
        onOpenChange={setOpen}
        title="Close with an outcome"
        description="It stays with the flag."
        closeLabel="Cancel"
      >
        <input aria-label="Note" />
      </Dialog>
    </>
  );
}

test('a dialog is named and described, takes the focus, and gives it back when Escape closes it', async () => {
  render(<Closing />);
  const opener = screen.getByRole('button', { name: 'Close the flag' });
  await userEvent.click(opener);
  const dialog = screen.getByRole('dialog', { name: 'Close with an outcome' });
  expect(document.getElementById(dialog.getAttribute('aria-describedby') ?? '')?.textContent).toBe(
    'It stays with the flag.',
  );
  expect(dialog.contains(document.activeElement)).toBe(true);
  await userEvent.keyboard('{Escape}');
  expect(screen.queryByRole('dialog')).toBeNull();
  await waitFor(() => expect(document.activeElement).toBe(opener));
});

test('a dialog without a description describes itself by nothing', () => {
  render(
    <Dialog open onOpenChange={vi.fn()} title="Keys" closeLabel="Close">
      J and K move.
    </Dialog>,
  );
  expect(screen.getByRole('dialog', { name: 'Keys' }).hasAttribute('aria-describedby')).toBe(false);
});

test('an alert dialog starts on the way out, and stays open after the answer', async () => {
  const onConfirm = vi.fn();
  const onOpenChange = vi.fn();
  render(
    <AlertDialog
      open
      onOpenChange={onOpenChange}
      title="Leave the check-in?"
      description="It is kept until tonight."
      cancelLabel="Stay"
      confirm={{ label: 'Leave', onConfirm, danger: true }}
    />,
  );
  const dialog = screen.getByRole('alertdialog', { name: 'Leave the check-in?' });
  expect(document.activeElement).toBe(screen.getByRole('button', { name: 'Stay' }));
  await userEvent.click(screen.getByRole('button', { name: 'Leave' }));
  expect(onConfirm).toHaveBeenCalledTimes(1);
  expect(onOpenChange).not.toHaveBeenCalled();
  expect(dialog.isConnected).toBe(true);
  await userEvent.click(screen.getByRole('button', { name: 'Stay' }));
  expect(onOpenChange).toHaveBeenCalledExactlyOnceWith(false);
});

test('a menu opens and runs its items by the keyboard alone', async () => {
  const onSelect = vi.fn();
  render(
    <DropdownMenu
      trigger={<Button>Account</Button>}
      head="Noor Haddad"
      items={[
        { key: 'settings', label: 'Settings', onSelect: vi.fn() },
        { key: 'sign-out', label: 'Sign out', onSelect },
      ]}
    />,
  );
  const trigger = screen.getByRole('button', { name: 'Account' });
  expect(trigger.getAttribute('aria-haspopup')).toBe('menu');
  trigger.focus();
  await userEvent.keyboard('{Enter}{ArrowDown}{Enter}');
  expect(onSelect).toHaveBeenCalledTimes(1);
  await waitFor(() => expect(screen.queryByRole('menu')).toBeNull());
});
