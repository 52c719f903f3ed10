import { useEffect, useEffectEvent } from 'react';
import { useNavigate } from 'react-router-dom';
import { useToast } from '#src/components/Toast.tsx';
import { useArrivals } from './arrivals.ts';
import { useMorningRound } from './queries.ts';
import { announcementOf } from './words.ts';

/** Tells of new flags where the queue is not on the screen. An emergency stays until somebody closes it. */
export function FlagToasts() {
  const { latest } = useArrivals(useMorningRound().data?.flags, null);
  const show = useToast();
  const navigate = useNavigate();
  const announce = useEffectEvent(() => {
    latest.forEach((flag) =>
      show({
        text: `New: ${announcementOf(flag)}`,
        shownMs: flag.urgency === 'emergency' ? null : undefined,
        action: { label: 'Open', onAction: () => void navigate(`/round/${flag.id}`) },
      }),
    );
  });
  useEffect(() => {
    announce();
  }, [latest]);
  return null;
}
