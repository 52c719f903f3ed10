import { useEffect, useState } from 'react';
import { classNames } from './class-names.ts';

/** Shorter waits show nothing, since a flash of grey lines reads as trouble. */
const delayMs = 300;

const widths = ['w-3/5', 'w-full', 'w-11/12', 'w-4/5'];

type Props = {
  /** What is being fetched, for those who hear the screen. */
  label: string;
  lines?: number;
};

/** Grey lines where text will stand; both they and the spoken label wait for 300 ms. */
export function LoadingState({ label, lines = 4 }: Props) {
  const [shown, setShown] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setShown(true), delayMs);
    return () => clearTimeout(timer);
  }, []);
  return (
    <div role="status" className="py-4">
      {shown ? (
        <>
          <span className="sr-only">{label}</span>
          <div aria-hidden className="grid gap-4 motion-safe:animate-pulse">
            {Array.from({ length: lines }, (_, line) => (
              <div key={line} className={classNames('h-4 rounded bg-wire', widths[line % widths.length])} />
            ))}
          </div>
        </>
      ) : null}
    </div>
  );
}
