import { Copy, Printer } from 'lucide-react';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Button } from '#src/components/Button.tsx';
import { Checkbox } from '#src/components/Checkbox.tsx';
import { useBusyWhile } from '#src/lib/busy.ts';

type Props = { codes: readonly string[]; onKept: () => void };

/** The recovery codes, which nobody is shown a second time: the way on asks whether they are kept. */
export function RecoveryCodes({ codes, onKept }: Props) {
  const { t } = useTranslation('accounts');
  const [copied, setCopied] = useState<'yes' | 'no' | null>(null);
  const [kept, setKept] = useState(false);
  const [asked, setAsked] = useState(false);
  // A reload would take them away.
  useBusyWhile(true);
  const copy = () =>
    navigator.clipboard.writeText(codes.join('\n')).then(
      () => setCopied('yes'),
      // Some browsers refuse it; the words beside the button say what to do then.
      () => setCopied('no'),
    );
  return (
    <div className="grid gap-4">
      <p>{t('codes.lead')}</p>
      <ol
        aria-label={t('codes.list')}
        className="grid grid-cols-1 gap-x-6 gap-y-1 rounded border border-wire bg-sheet px-4 py-3 font-mono text-lg min-[22rem]:grid-cols-2"
      >
        {codes.map((code) => (
          <li key={code} className="select-all">
            {code}
          </li>
        ))}
      </ol>
      <div className="flex flex-wrap items-center gap-3 print:hidden">
        <Button variant="outline" icon={Copy} onClick={() => void copy()}>
          {t('codes.copy')}
        </Button>
        <Button variant="outline" icon={Printer} onClick={() => window.print()}>
          {t('codes.print')}
        </Button>
        <p role="status" className="text-sm font-bold">
          {copied === 'yes' ? t('codes.copied') : copied === 'no' ? t('codes.copyFailed') : null}
        </p>
      </div>
      <div className="grid gap-3 print:hidden">
        <Checkbox
          label={t('codes.kept')}
          checked={kept}
          onChange={({ target }) => setKept(target.checked)}
          aria-describedby="codes-kept-first"
        />
        <p id="codes-kept-first" role="alert" className="text-sm font-bold text-clay empty:hidden">
          {asked && !kept ? t('codes.keptFirst') : null}
        </p>
        <Button size="large" block onClick={() => (kept ? onKept() : setAsked(true))}>
          {t('codes.goOn')}
        </Button>
      </div>
    </div>
  );
}
