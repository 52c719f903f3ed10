import type { InvitationLetter } from '#shared/people/contract.ts';
import { formatMoment } from '#src/lib/format.ts';

type Props = { letter: InvitationLetter; nowMs: number; timeZone: string };

/** Beside somebody at the clinic: a code large enough to be read by their own phone from this screen. */
export function PhoneSetUp({ letter, nowMs, timeZone }: Props) {
  return (
    <div className="grid justify-items-center gap-5 text-center text-xl">
      <h1 className="text-3xl leading-tight wrap-anywhere">{letter.name}: point your phone’s camera here</h1>
      {/* A QR code is read as dark on light, also where the screen is dark. */}
      <img
        src={letter.picture}
        alt="The link as a QR code"
        className="w-[min(80vw,60vh,34rem)] rounded bg-[#fff] p-2"
      />
      <p>
        Or open <strong className="wrap-anywhere">{letter.startAddress}</strong> on the phone and type
      </p>
      <p className="text-4xl font-black tracking-[0.12em] wrap-anywhere">{letter.code}</p>
      <p className="text-base text-ink-soft">
        Valid until {formatMoment(letter.expiresAt, nowMs, timeZone)}, and only once. Let the patient choose
        the password or passkey themselves, on their own phone.
      </p>
    </div>
  );
}
