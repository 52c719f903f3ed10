import { useSession } from '#src/app/session.tsx';
import { EntryFrame } from '#src/features/accounts/EntryFrame.tsx';
import { InvitationByLink } from '#src/features/accounts/InvitationByLink.tsx';
import { LostInvitation } from '#src/features/accounts/LostInvitation.tsx';
import { useOneTimeSecret } from '#src/features/accounts/one-time-secret.ts';

/** `/invitation#secret`: what the link of the mail and the picture of the letter open. */
export function InvitationPage() {
  const token = useOneTimeSecret();
  const somebodyHere = Boolean(useSession().data?.me);
  return (
    <EntryFrame>
      {token === null ? (
        <LostInvitation why="noSecret" />
      ) : (
        <InvitationByLink key={token} token={token} somebodyHere={somebodyHere} />
      )}
    </EntryFrame>
  );
}
