import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useBusyWhile } from '#src/lib/busy.ts';
import { ClosedInvitation } from './ClosedInvitation.tsx';
import { InvitationPassword } from './InvitationPassword.tsx';
import { InvitationWelcome } from './InvitationWelcome.tsx';
import { useLook } from './invitation-queries.ts';
import type { DeviceChoice, InvitationKey, SeenInvitation } from './invitation-queries.ts';

type Props = { invitation: InvitationKey; seen: SeenInvitation; somebodyHere: boolean };

/** From an invitation to being signed in. What was chosen stays when another way is tried. */
export function InvitationSteps({ invitation, seen: seenFirst, somebodyHere }: Props) {
  const { t } = useTranslation('accounts');
  const [device, setDevice] = useState<DeviceChoice | null>(null);
  const [byPassword, setByPassword] = useState(false);
  // It may be used up or taken back while this screen is open: then it is looked at again.
  const again = useLook();
  const seen = again.data ?? seenFirst;
  useBusyWhile(seen.state === 'open');
  if (seen.state !== 'open')
    return <ClosedInvitation invitation={invitation} seen={seen} state={seen.state} />;
  const shared = {
    invitation,
    seen,
    device,
    onDevice: setDevice,
    onSpent: () => again.mutate(invitation),
  };
  const note = somebodyHere ? t('invitation.somebodyHere') : null;
  return byPassword ? (
    <InvitationPassword {...shared} onBack={() => setByPassword(false)} />
  ) : (
    <InvitationWelcome {...shared} note={note} onPassword={() => setByPassword(true)} />
  );
}
