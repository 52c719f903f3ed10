import { useTranslation } from 'react-i18next';
import type { CaregiverCard } from '#shared/patients/contract.ts';
import { invitationLifeMs } from '#shared/people/invitations.ts';
import { Button } from '#src/components/Button.tsx';
import { Tag } from '#src/components/Tag.tsx';
import type { TagTone } from '#src/components/Tag.tsx';
import { formatDate, localDateOf } from '#src/lib/format.ts';

type State = 'active' | 'invited' | 'ended';

const tones: Record<State, TagTone> = { active: 'leaf', invited: 'slate', ended: 'bark' };

function stateOf({ endedAt, firstOpenedAt }: CaregiverCard): State {
  if (endedAt !== null) return 'ended';
  return firstOpenedAt === null ? 'invited' : 'active';
}

/** The last day of an invitation. It is told of everybody alike: who has an account needs none. */
const goodUntil = (createdAt: string): string =>
  localDateOf(Date.parse(createdAt) + invitationLifeMs.caregiver);

function mayOf({ mayCheckIn, mayMessage }: CaregiverCard): 'both' | 'checkIn' | 'message' | 'none' {
  if (mayCheckIn) return mayMessage ? 'both' : 'checkIn';
  return mayMessage ? 'message' : 'none';
}

type Props = { card: CaregiverCard; onChange: () => void; onEnd: () => void };

/** One person whom the patient let in: who, what they may do, until when, and who let them in. */
export function CaregiverRow({ card, onChange, onEnd }: Props) {
  const { t } = useTranslation('caregivers');
  const state = stateOf(card);
  const { name, relationship, email, until, createdAt, endedAt, byClinic, grantedBy, consent } = card;
  return (
    <li className="grid gap-3 border-b border-wire py-4 last:border-b-0">
      <div className="min-w-0">
        <p className="flex flex-wrap items-center gap-x-3 gap-y-1">
          <bdi className="font-bold">{name}</bdi>
          <Tag tone={tones[state]}>{t(`state.${state}`)}</Tag>
        </p>
        <p className="text-ink-soft">
          <bdi>{relationship}</bdi> · {email}
        </p>
        <p className="mt-1">
          {t(`may.${mayOf(card)}`)}{' '}
          {endedAt === null
            ? until === null
              ? t('open')
              : t('until', { date: formatDate(until) })
            : t('endedOn', { date: formatDate(localDateOf(endedAt)) })}
        </p>
        {state === 'invited' ? (
          <p className="text-sm text-ink-soft">
            {t('invited', {
              date: formatDate(localDateOf(createdAt)),
              until: formatDate(goodUntil(createdAt)),
            })}
          </p>
        ) : null}
        {byClinic ? (
          <p className="text-sm text-ink-soft">
            {t('byClinic', { name: grantedBy, consent: consent ?? '' })}
          </p>
        ) : null}
      </div>
      {endedAt === null ? (
        <div className="flex flex-wrap gap-3">
          <Button variant="outline" aria-label={t('changeNamed', { name })} onClick={onChange}>
            {t('change')}
          </Button>
          <Button variant="danger-outline" aria-label={t('endNamed', { name })} onClick={onEnd}>
            {t('end')}
          </Button>
        </div>
      ) : null}
    </li>
  );
}
