import { X } from 'lucide-react';
import { createContext, use, useCallback, useEffect, useRef, useState } from 'react';
import type { ReactNode } from 'react';
import { Button } from './Button.tsx';
import { IconButton } from './IconButton.tsx';

/** Nobody reads a message in less; a caller may ask for more, never for less. */
const leastShownMs = 8_000;

export type ToastMessage = {
  text: string;
  action?: { label: string; onAction: () => void };
  /** How long it stays; `null` until it is closed by hand. */
  shownMs?: number | null;
};

type ShownToast = ToastMessage & { id: number };

const ToastContext = createContext<((message: ToastMessage) => void) | null>(null);

/** The function that shows a short message at the edge of the screen. */
export function useToast(): (message: ToastMessage) => void {
  const show = use(ToastContext);
  if (!show) throw new Error('useToast needs a ToastProvider above it.');
  return show;
}

type ProviderProps = {
  /** Name of the region where messages appear. */
  label: string;
  closeLabel: string;
  children: ReactNode;
};

/**
 * Holds the messages and the polite live region that announces them. The region is there from the start,
 * because one that arrives together with its message is not announced.
 */
export function ToastProvider({ label, closeLabel, children }: ProviderProps) {
  const [toasts, setToasts] = useState<ShownToast[]>([]);
  const nextId = useRef(1);
  const show = useCallback((message: ToastMessage) => {
    const id = nextId.current;
    nextId.current += 1;
    setToasts((shown) => [...shown, { ...message, id }]);
  }, []);
  const close = useCallback((id: number) => {
    setToasts((shown) => shown.filter((toast) => toast.id !== id));
  }, []);
  return (
    <ToastContext value={show}>
      {children}
      <section
        aria-label={label}
        className="pointer-events-none fixed inset-x-0 top-[env(safe-area-inset-top)] z-50 p-3 print:hidden"
      >
        <div role="status" className="mx-auto grid max-w-md justify-items-stretch gap-2 lg:mr-0">
          {toasts.map((toast) => (
            <ToastCard key={toast.id} toast={toast} closeLabel={closeLabel} onClose={close} />
          ))}
        </div>
      </section>
    </ToastContext>
  );
}

type CardProps = { toast: ShownToast; closeLabel: string; onClose: (id: number) => void };

function ToastCard({ toast, closeLabel, onClose }: CardProps) {
  // The clock stands still while a pointer or the focus is on the message.
  const [held, setHeld] = useState(false);
  const { id, shownMs } = toast;
  useEffect(() => {
    if (held || shownMs === null) return undefined;
    const timer = setTimeout(() => onClose(id), Math.max(shownMs ?? leastShownMs, leastShownMs));
    return () => clearTimeout(timer);
  }, [held, id, shownMs, onClose]);
  return (
    <div
      onPointerEnter={() => setHeld(true)}
      onPointerLeave={() => setHeld(false)}
      onFocus={() => setHeld(true)}
      onBlur={() => setHeld(false)}
      className="pointer-events-auto flex flex-wrap items-center gap-x-3 rounded border border-wire-strong bg-sheet py-1 pr-1 pl-4 shadow-xl"
    >
      <p className="min-w-0 grow basis-40 py-2">{toast.text}</p>
      {toast.action ? (
        <Button
          variant="quiet"
          onClick={() => {
            toast.action?.onAction();
            onClose(id);
          }}
        >
          {toast.action.label}
        </Button>
      ) : null}
      <IconButton icon={X} label={closeLabel} onClick={() => onClose(id)} />
    </div>
  );
}
