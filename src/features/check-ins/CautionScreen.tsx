import { HeartHandshake } from 'lucide-react';
import { useEffect, useRef } from 'react';
import { useTranslation } from 'react-i18next';
import type { ClinicCard } from '#shared/clinic/contract.ts';
import type { CheckInMode } from '#shared/check-ins/screens.ts';
import type { Finding } from '#shared/red-flags/findings.ts';
import { useHoldScreen } from '#src/app/caution-hold.ts';
import { isClosed } from '#src/app/clinic-hours.ts';
import { Button } from '#src/components/Button.tsx';
import { SignShape } from '#src/components/SignShape.tsx';
import { classNames } from '#src/components/class-names.ts';
import { useNowMs } from '#src/lib/now.ts';
import type { OutgoingAlert } from './alert-outbox.ts';
import { AlertStatus } from './AlertStatus.tsx';
import { CautionCalls, lookOf } from './CautionCalls.tsx';
import type { CautionLook } from './CautionCalls.tsx';
import { findingWords } from './finding-words.ts';

type Props = {
  /** The serious findings, the most urgent first; at least one. */
  findings: readonly Finding[];
  clinic: ClinicCard;
  mode: CheckInMode;
  alertId: string;
  entry: OutgoingAlert | undefined;
  onMistake: () => void;
  onGoOn: () => void;
};

const grounds: Record<CautionLook, string> = {
  emergency: 'bg-clay-wash',
  crisis: 'bg-slate-wash',
  urgent: 'bg-ochre-wash',
};

/**
 * The whole screen, at once, from what is on the device: whom to call, what was told, what to do meanwhile, and
 * what the clinic knows so far.
 */
export function CautionScreen(props: Props) {
  const { findings, clinic, mode, alertId, entry, onMistake, onGoOn } = props;
  const { t } = useTranslation(['check-in-screens', 'rules']);
  const heading = useRef<HTMLHeadingElement>(null);
  useHoldScreen(true);
  useEffect(() => {
    window.scrollTo(0, 0);
    heading.current?.focus();
  }, []);
  const look = lookOf(findings);
  const nowMs = useNowMs();
  const words = findingWords(t, findings, clinic, isClosed(clinic, nowMs));
  return (
    <div className={classNames('base-large min-h-dvh', grounds[look])}>
      <main className="mx-auto grid w-full max-w-xl grid-cols-1 gap-5 px-5 py-8">
        {look === 'crisis' ? (
          <HeartHandshake className="size-16 text-slate" strokeWidth={1.5} aria-hidden />
        ) : (
          <SignShape shape={look === 'emergency' ? 'octagon' : 'triangle'} size="large" />
        )}
        <div className="grid gap-2">
          <h1 ref={heading} tabIndex={-1} className="text-3xl leading-tight">
            {words.title}
          </h1>
          <p className="text-lg leading-snug">
            {t('rules:caution.told')} <strong>{words.told}.</strong> {words.why.slice(0, 2).join(' ')}
          </p>
        </div>
        <CautionCalls look={look} findings={findings} clinic={clinic} />
        <section className="grid gap-2 rounded bg-sheet px-4 py-3.5">
          <h2 className="text-lg">{t('rules:caution.while-you-wait')}</h2>
          {words.meanwhile.map((advice) => (
            <p key={advice}>{advice}</p>
          ))}
        </section>
        <AlertStatus entry={entry} alertId={alertId} onCallNumber={clinic.onCallNumber} />
        {/* In an emergency the next thing is the call, and what the clinic knows stands above. */}
        {look === 'urgent' ? <p>{words.next[0]}</p> : null}
        <div className="grid justify-items-start gap-2">
          <Button variant="outline" onClick={onGoOn}>
            {t(`caution.goOn.${mode}`)}
          </Button>
          <button
            type="button"
            onClick={onMistake}
            className="min-h-target text-left text-ink underline underline-offset-4"
          >
            {t('rules:caution.mistake')}
          </button>
        </div>
      </main>
    </div>
  );
}
