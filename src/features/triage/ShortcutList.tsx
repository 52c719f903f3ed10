import { Checkbox } from '#src/components/Checkbox.tsx';
import { Dialog } from '#src/components/Dialog.tsx';
import { Kbd } from '#src/components/Kbd.tsx';
import { setShortcutsOn, useShortcutsOn } from './shortcut-setting.ts';

const keys = [
  { key: 'J', does: 'The next case' },
  { key: 'K', does: 'The case before' },
  { key: 'Enter', does: 'Open what has the focus' },
  { key: 'C', does: 'Claim' },
  { key: 'R', does: 'Reply' },
  { key: 'X', does: 'Close with an outcome' },
  { key: '?', does: 'This list' },
];

type Props = { open: boolean; onOpenChange: (open: boolean) => void };

export function ShortcutList({ open, onOpenChange }: Props) {
  const on = useShortcutsOn();
  return (
    <Dialog open={open} onOpenChange={onOpenChange} title="Keys of the morning round" closeLabel="Close">
      <dl className="grid grid-cols-[auto_minmax(0,1fr)] items-center gap-x-4 gap-y-2">
        {keys.map(({ key, does }) => (
          <div key={key} className="col-span-full grid grid-cols-subgrid items-center">
            <dt>
              <Kbd>{key}</Kbd>
            </dt>
            <dd>{does}</dd>
          </div>
        ))}
      </dl>
      <div className="mt-5">
        <Checkbox
          label="Use single keys"
          checked={on}
          onChange={(event) => setShortcutsOn(event.target.checked)}
        />
        <p className="text-sm text-ink-soft">
          Switched off, nothing happens when a letter is hit or dictated by mistake. Kept on this device.
        </p>
      </div>
    </Dialog>
  );
}
