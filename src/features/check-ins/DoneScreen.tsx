import { CircleCheck } from 'lucide-react';
import { useEffect, useRef } from 'react';
import { Trans, useTranslation } from 'react-i18next';
import type { CheckInReceipt } from '#shared/check-ins/contract.ts';
import type { ClinicCard } from '#shared/clinic/contract.ts';
import type { Finding } from '#shared/red-flags/findings.ts';
import { isClosed } from '#src/app/clinic-hours.ts';
import { EmergencyLine } from '#src/components/EmergencyLine.tsx';
import { BottomDock } from '#src/components/BottomDock.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { SignShape } from '#src/components/SignShape.tsx';
import type { SignShapeName } from '#src/components/SignShape.tsx';
import { classNames } from '#src/components/class-names.ts';
import { useNowMs } from '#src/lib/now.ts';
import { formatMoment, telephoneHref } from '#src/lib/format.ts';
import { CautionCalls, lookOf } from './CautionCalls.tsx';
import { findingWords } from './finding-words.ts';

type Props = {
  receipt: CheckInReceipt;
  findings: readonly Finding[];
  firstName: string;
  clinic: ClinicCard;
};

const looks: Record<Finding['urgency'], { shape: SignShapeName; ground: string }> = {
  emergency: { shape: 'octagon', ground: 'bg-clay-wash' },
  urgent: { shape: 'triangle', ground: 'bg-ochre-wash' },
  'same-day': { shape: 'half-circle', ground: 'bg-slate-wash' },
  routine: { shape: 'ring', ground: 'bg-moss-wash' },
};

/** After sending: what was found on the device, and what happens next, from the clinic's hours. */
export function DoneScreen({ receipt, findings, firstName, clinic }: Props) {
  const { t } = useTranslation(['check-in-screens', 'rules', 'app']);
  const heading = useRef<HTMLHeadingElement>(null);
  const nowMs = useNowMs();
  useEffect(() => {
    window.scrollTo(0, 0);
    heading.current?.focus();
  }, []);
  const highest = findings.filter(({ urgency }) => urgency === findings[0]?.urgency);
  const closed = isClosed(clinic, nowMs);
  const emergency = findings[0]?.urgency === 'emergency';
  const others = findings.filter(({ urgency }) => urgency !== findings[0]?.urgency);
  return (
    <div className="base-large flex min-h-dvh flex-col">
      <main className="mx-auto grid w-full max-w-xl grow grid-cols-1 content-start gap-5 px-5 py-8">
        {emergency ? (
          <SignShape shape="octagon" size="large" />
        ) : (
          <CircleCheck className="size-16 text-leaf" strokeWidth={1.5} aria-hidden />
        )}
        <div className="grid gap-1">
          <h1 ref={heading} tabIndex={-1} className="text-2xl leading-tight">
            {emergency
              ? findingWords(t, highest, clinic, closed).title
              : t('done.title', { name: firstName })}
          </h1>
          <p>
            {t('done.sent', { time: formatMoment(receipt.receivedAt, nowMs) })}{' '}
            {receipt.clockDoubtful ? t('done.clock') : null}
          </p>
        </div>
        <Advice findings={highest} others={others} clinic={clinic} closed={closed} />
        <div className="grid gap-2">
          {findings.length === 0 ? <p className="font-bold">{t('done.quiet')}</p> : null}
          <ClinicHours clinic={clinic} nowMs={nowMs} />
          <p>{t('done.worse', { number: clinic.emergencyNumber })}</p>
        </div>
        <LinkButton to="/today" size="large" block>
          {t('done.today')}
        </LinkButton>
      </main>
      <BottomDock>
        <EmergencyLine label={t('app:emergency.label')} href={telephoneHref(clinic.emergencyNumber)}>
          {t('emergency', { number: clinic.emergencyNumber })}
        </EmergencyLine>
      </BottomDock>
    </div>
  );
}

type AdviceProps = {
  findings: readonly Finding[];
  others: readonly Finding[];
  clinic: ClinicCard;
  closed: boolean;
};

/** One text for what is most urgent; what is less so is named after it. */
function Advice({ findings, others, clinic, closed }: AdviceProps) {
  const { t } = useTranslation(['check-in-screens', 'rules']);
  const first = findings[0];
  if (!first) return null;
  const look = looks[first.urgency];
  const words = findingWords(t, findings, clinic, closed);
  return (
    <section className={classNames('grid gap-2 rounded px-4 py-3.5', look.ground)}>
      <h2 className="flex items-center gap-2.5 text-lg">
        <SignShape shape={look.shape} />
        <span className="min-w-0">{words.title}</span>
      </h2>
      <p>
        {t('rules:caution.told')} <strong>{words.told}.</strong> {words.why.join(' ')}
      </p>
      {words.meanwhile.map((advice) => (
        <p key={advice}>{advice}</p>
      ))}
      {/* In an emergency, or close to one, the next thing is a call. */}
      {first.urgency === 'emergency' || first.urgency === 'urgent' ? (
        <CautionCalls look={lookOf(findings)} findings={findings} clinic={clinic} />
      ) : null}
      {first.urgency === 'emergency' ? null : <p>{words.next[0]}</p>}
      {others.length > 0 ? (
        <p>{t('done.alsoSeen', { told: findingWords(t, others, clinic, closed).told })}</p>
      ) : null}
    </section>
  );
}

function ClinicHours({ clinic, nowMs }: { clinic: ClinicCard; nowMs: number }) {
  const { t } = useTranslation('check-in-screens');
  if (!isClosed(clinic, nowMs)) return <p>{t('done.open')}</p>;
  return (
    <p>
      {clinic.opensAt ? t('done.opens', { time: formatMoment(clinic.opensAt, nowMs) }) : null}{' '}
      <a href={telephoneHref(clinic.onCallNumber)} className="underline underline-offset-4">
        <Trans
          t={t}
          i18nKey="done.onCall"
          values={{ number: clinic.onCallNumber }}
          components={{ tel: <span className="whitespace-nowrap" /> }}
        />
      </a>
    </p>
  );
}
