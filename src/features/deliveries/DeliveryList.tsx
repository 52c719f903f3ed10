import { Bell, Mail, MessageSquareText, Phone, RotateCw } from 'lucide-react';
import type { LucideIcon } from 'lucide-react';
import type { Delivery } from '#shared/notifications/contract.ts';
import { Refused } from '#src/app/Refused.tsx';
import { Button } from '#src/components/Button.tsx';
import { formatMoment } from '#src/lib/format.ts';
import { useSendAgain } from './queries.ts';
import { channelWords, failureOf, kindWords, stateOf, triesWords } from './words.ts';

const channelIcons: Record<Delivery['channel'], LucideIcon> = {
  push: Bell,
  email: Mail,
  sms: MessageSquareText,
  phone: Phone,
};

type Props = { deliveries: Delivery[]; nowMs: number; timeZone: string; onSent: (words: string) => void };

/** What left the product, or should have: to whom, by which way, when, and what became of it. */
export function DeliveryList({ deliveries, ...rest }: Props) {
  return (
    <ul>
      {deliveries.map((delivery) => (
        <DeliveryRow key={delivery.id} delivery={delivery} {...rest} />
      ))}
    </ul>
  );
}

type RowProps = Omit<Props, 'deliveries'> & { delivery: Delivery };

function DeliveryRow({ delivery, nowMs, timeZone, onSent }: RowProps) {
  const again = useSendAgain();
  const { id, person, channel, kind, state, attempts, createdAt, sentAt } = delivery;
  const Icon = channelIcons[channel];
  const failure = state === 'sent' ? null : failureOf(delivery);
  const hasFailed = state === 'failed' || state === 'bounced';
  const moment = (instant: string) => formatMoment(instant, nowMs, timeZone);
  return (
    <li className="flex flex-wrap items-start gap-x-6 gap-y-2 border-b border-wire py-3 leading-snug last:border-b-0">
      <div className="flex min-w-0 grow basis-72 gap-3">
        <Icon className="mt-0.5 size-5 shrink-0 text-bark" aria-hidden />
        <div className="min-w-0">
          <p className="wrap-anywhere">
            <span className="font-bold">{kindWords[kind]}</span> to {person.name}
          </p>
          <p className="text-sm text-ink-soft">
            {channelWords[channel]} · {moment(createdAt)}
            {attempts > 0 ? ` · ${triesWords(attempts)}` : null}
            {sentAt === null ? null : ` · sent ${moment(sentAt)}`}
          </p>
          {failure === null ? null : <p className={hasFailed ? 'text-clay' : undefined}>{failure}</p>}
        </div>
      </div>
      <div className="grid justify-items-start gap-2">
        <p className={hasFailed ? 'font-bold text-clay' : 'text-ink-soft'}>{stateOf(delivery)}</p>
        {hasFailed ? (
          <Button
            variant="outline"
            icon={RotateCw}
            busy={again.isPending}
            aria-label={`Send again: ${kindWords[kind]} to ${person.name}`}
            onClick={() =>
              again.mutate(id, { onSuccess: () => onSent(`It is on its way again to ${person.name}.`) })
            }
          >
            Send again
          </Button>
        ) : null}
        <Refused error={again.error} />
      </div>
    </li>
  );
}
