import { CircleCheck } from 'lucide-react';
import { useEffect, useRef } from 'react';
import { useTranslation } from 'react-i18next';
import type { CheckInReceipt } from '#shared/check-ins/contract.ts';
import type { ClinicCard } from '#shared/clinic/contract.ts';
import type { Finding } from '#shared/red-flags/findings.ts';
import { patientTextOf } from '#shared/red-flags/patient-text.ts';
import { EmergencyLine } from '#src/components/EmergencyLine.tsx';
import { BottomDock } from '#src/components/BottomDock.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { SignShape } from '#src/components/SignShape.tsx';
import type { SignShapeName } from '#src/components/SignShape.tsx';
import { classNames } from '#src/components/class-names.ts';
import { useNowMs } from '#src/lib/now.ts';
import { formatMoment, telephoneHref } from '#src/lib/format.ts';

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
  const { t } = useTranslation(['check-in-screens', 'rules', 'common']);
  const heading = useRef<HTMLHeadingElement>(null);
  const nowMs = useNowMs();
  const title = t('done.title', { name: firstName });
  useEffect(() => {
    document.title = t('common:title', { page: title });
    heading.current?.focus();
  }, [t, title]);
  const numbers = {
    emergencyNumber: clinic.emergencyNumber,
    crisisNumber: clinic.crisisNumber,
    onCallNumber: clinic.onCallNumber,
  };
  return (
    <div className="base-large flex min-h-dvh flex-col">
      <main className="mx-auto grid w-full max-w-xl grow content-start gap-5 px-5 py-8">
        <CircleCheck className="size-16 text-leaf" strokeWidth={1.5} aria-hidden />
        <div className="grid gap-1">
          <h1 ref={heading} tabIndex={-1} className="text-2xl leading-tight">
            {title}
          </h1>
          <p>
            {t('done.sent', { time: formatMoment(receipt.receivedAt, nowMs) })}{' '}
            {receipt.clockDoubtful ? t('done.clock') : null}
          </p>
        </div>
        {findings.map((finding) => {
          const { values, ...keys } = patientTextOf(finding);
          const words = (key: string) => t(key, { ...numbers, ...values });
          const look = looks[finding.urgency];
          return (
            <section key={finding.code} className={classNames('grid gap-2 rounded px-4 py-3.5', look.ground)}>
              <h2 className="flex items-center gap-2.5 text-lg">
                <SignShape shape={look.shape} />
                <span className="min-w-0">{words(keys.title)}</span>
              </h2>
              <p>
                {t('rules:caution.told')} <strong>{words(keys.told)}.</strong> {words(keys.why)}
              </p>
              <p>{words(keys.meanwhile)}</p>
              <p>{words(keys.next)}</p>
            </section>
          );
        })}
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
        <EmergencyLine label={t('common:emergency.label')} href={telephoneHref(clinic.emergencyNumber)}>
          {t('common:emergency.short', { number: clinic.emergencyNumber })}
        </EmergencyLine>
      </BottomDock>
    </div>
  );
}

function ClinicHours({ clinic, nowMs }: { clinic: ClinicCard; nowMs: number }) {
  const { t } = useTranslation('check-in-screens');
  if (clinic.openNow) return <p>{t('done.open')}</p>;
  return (
    <p>
      {clinic.opensAt ? t('done.opens', { time: formatMoment(clinic.opensAt, nowMs) }) : null}{' '}
      <a href={telephoneHref(clinic.onCallNumber)} className="underline underline-offset-4">
        {t('done.onCall', { number: clinic.onCallNumber })}
      </a>
    </p>
  );
}
