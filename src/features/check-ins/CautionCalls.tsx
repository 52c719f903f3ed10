import { Phone } from 'lucide-react';
import { useTranslation } from 'react-i18next';
import type { ClinicCard } from '#shared/clinic/contract.ts';
import type { Finding } from '#shared/red-flags/findings.ts';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { telephoneHref } from '#src/lib/format.ts';

export type CautionLook = 'emergency' | 'crisis' | 'urgent';

/** By the most urgent finding, which stands first. */
export function lookOf([first]: readonly Finding[]): CautionLook {
  if (first?.code === 'self-harm') return 'crisis';
  return first?.urgency === 'emergency' ? 'emergency' : 'urgent';
}

type Props = { look: CautionLook; findings: readonly Finding[]; clinic: ClinicCard };

/** Whom to call, the one that matters most first and filled. */
export function CautionCalls({ look, findings, clinic }: Props) {
  const { t } = useTranslation(['check-in-screens', 'rules']);
  const crisis = findings.some(({ code }) => code === 'self-harm');
  const emergency = (
    <LinkButton
      href={telephoneHref(clinic.emergencyNumber)}
      variant={look === 'emergency' ? 'danger' : 'danger-outline'}
      size="large"
      block
      icon={Phone}
    >
      {t('rules:caution.call', { number: clinic.emergencyNumber })}
    </LinkButton>
  );
  const crisisLine = crisis ? (
    <LinkButton href={telephoneHref(clinic.crisisNumber)} size="large" block icon={Phone}>
      {t('caution.crisis', { number: clinic.crisisNumber })}
    </LinkButton>
  ) : null;
  const onCall = (
    <LinkButton
      href={telephoneHref(clinic.onCallNumber)}
      variant={look === 'emergency' ? 'danger-outline' : look === 'urgent' ? 'primary' : 'outline'}
      size="large"
      block
      icon={look === 'urgent' ? Phone : undefined}
    >
      {t('rules:caution.call-clinic')}
    </LinkButton>
  );
  if (look === 'crisis') {
    return (
      <div className="grid gap-3">
        {crisisLine}
        {emergency}
        {onCall}
      </div>
    );
  }
  return (
    <div className="grid gap-3">
      {look === 'emergency' ? emergency : onCall}
      {look === 'emergency' ? crisisLine : null}
      {look === 'emergency' ? onCall : emergency}
    </div>
  );
}
