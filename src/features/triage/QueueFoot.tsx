import { Keyboard } from 'lucide-react';
import { Button } from '#src/components/Button.tsx';
import { Kbd } from '#src/components/Kbd.tsx';
import { useShortcutsOn } from './shortcut-setting.ts';

/** The keys in short, for who has a keyboard; the button leads to the whole list and the switch. */
export function QueueFoot({ onShowKeys }: { onShowKeys: () => void }) {
  const on = useShortcutsOn();
  return (
    <div className="flex flex-wrap items-center gap-x-4 gap-y-1 px-5 py-4 text-sm text-ink-soft [@media(hover:none)]:hidden">
      {on ? (
        <>
          <span className="flex items-center gap-1.5">
            <Kbd>J</Kbd> <Kbd>K</Kbd> move
          </span>
          <span className="flex items-center gap-1.5">
            <Kbd>C</Kbd> claim
          </span>
          <span className="flex items-center gap-1.5">
            <Kbd>R</Kbd> reply
          </span>
          <span className="flex items-center gap-1.5">
            <Kbd>X</Kbd> close
          </span>
        </>
      ) : (
        <span>Single keys are switched off.</span>
      )}
      <div className="-ml-4">
        <Button variant="quiet" icon={Keyboard} onClick={onShowKeys}>
          All keys
        </Button>
      </div>
    </div>
  );
}
