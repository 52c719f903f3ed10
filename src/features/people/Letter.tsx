import type { InvitationLetter } from '#shared/people/contract.ts';
import { Mark } from '#src/components/Mark.tsx';
import { Wire } from '#src/components/Wire.tsx';
import { formatDateAndYear, formatTime, localDateOf } from '#src/lib/format.ts';

type Props = { letter: InvitationLetter; timeZone: string };

/**
 * What is put into somebody's hand: on one page, to be read by old eyes. 14 pt is 1.1667 rem where a rem is
 * 16 px; everything here is at least that, on paper too.
 */
export function Letter({ letter, timeZone }: Props) {
  const { name, clinic, startAddress, code, picture, expiresAt } = letter;
  const until = `${formatDateAndYear(localDateOf(expiresAt, timeZone))}, ${formatTime(expiresAt, timeZone)}`;
  return (
    <article className="grid gap-6 text-xl leading-normal text-ink">
      <header className="grid gap-3">
        <div className="flex flex-wrap items-center justify-between gap-x-8 gap-y-2">
          <Mark />
          <p>
            <span className="font-bold">{clinic.name}</span>, {clinic.phone}
          </p>
        </div>
        <Wire />
      </header>
      <div className="grid gap-4">
        <h1 className="text-3xl leading-tight wrap-anywhere">{name}, this is your way in</h1>
        <p>
          {clinic.name} uses Espalier to stay in touch with you. It is a website. You open it on your phone or
          computer, with this letter beside you.
        </p>
      </div>
      <div className="grid items-start gap-x-10 gap-y-6 sm:grid-cols-[minmax(0,1fr)_auto] print:grid-cols-[minmax(0,1fr)_auto]">
        <ol className="grid list-decimal gap-4 pl-7">
          <li>
            Point your phone’s camera at the square picture and open the link. Or type this address into your
            browser:
            <span className="block text-2xl font-black wrap-anywhere">{startAddress}</span>
          </li>
          <li>
            If you typed the address, type this code as well:
            <span className="mt-1 block text-4xl leading-snug font-black tracking-[0.12em] wrap-anywhere">
              {code}
            </span>
          </li>
          <li>Follow the steps on the screen. They take a few minutes.</li>
        </ol>
        {/* A QR code is read as dark on light, also where the screen is dark. */}
        <img src={picture} alt="The link as a QR code" className="size-52 rounded bg-[#fff] p-1" />
      </div>
      <p className="font-bold">
        It can be used until {until}, and only once. Keep it to yourself: it opens your account.
      </p>
      <p>
        It does not work, or the time is over? Ring {clinic.name} at{' '}
        <span className="font-bold whitespace-nowrap">{clinic.phone}</span>. We make you a new one.
      </p>
      <Wire />
      <p className="text-2xl leading-snug font-black">
        This is not for emergencies. In an emergency call {clinic.emergencyNumber}.
      </p>
    </article>
  );
}
