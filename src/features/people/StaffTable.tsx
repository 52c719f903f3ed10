import { MailX } from 'lucide-react';
import { Link } from 'react-router-dom';
import type { StaffPerson } from '#shared/people/contract.ts';
import { formatMoment } from '#src/lib/format.ts';
import { personPlace } from './people-places.ts';
import { actWords, nameAndTitle, roleWords, staffStateWords } from './words.ts';

type Props = { people: StaffPerson[]; nowMs: number; timeZone: string };

const cellClass = 'py-3 pr-4 align-top @max-3xl/clinic:block @max-3xl/clinic:py-0';
const columns = ['Name', 'Roles', 'State', 'Second factor', 'Last active'];

/** Everybody who works for the clinic; where there is no room for columns, cells stand under each other. */
export function StaffTable({ people, nowMs, timeZone }: Props) {
  return (
    <table className="w-full border-collapse text-left text-[0.9375rem]">
      <caption className="sr-only">People</caption>
      <thead className="border-b border-wire text-sm text-ink-soft @max-3xl/clinic:sr-only">
        <tr>
          {columns.map((column) => (
            <th key={column} scope="col" className="py-2 pr-4">
              {column}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {people.map((person) => (
          <tr
            key={person.id}
            className="border-b border-wire last:border-b-0 @max-3xl/clinic:block @max-3xl/clinic:py-3"
          >
            <th scope="row" className={cellClass}>
              <Link
                to={personPlace(person.id)}
                className="inline-block py-0.5 wrap-anywhere underline-offset-3 hover:underline"
              >
                {nameAndTitle(person)}
              </Link>
              <span className="block text-sm font-normal text-ink-soft wrap-anywhere">{person.email}</span>
            </th>
            <td className={cellClass}>
              {person.roles.map((role) => roleWords[role]).join(', ') || 'No role'}
              {person.waiting.map((act) => (
                <span key={act.id} className="block text-sm text-ink-soft">
                  Waits for a second person: {actWords(act).toLowerCase()}
                </span>
              ))}
            </td>
            <td className={person.active ? cellClass : `${cellClass} font-bold`}>
              {staffStateWords(person, nowMs, timeZone)}
              {person.emailBounced ? (
                <span className="flex items-start gap-1.5 font-bold text-clay">
                  <MailX className="mt-0.5 size-4 shrink-0" aria-hidden />
                  Mail came back
                </span>
              ) : null}
            </td>
            <td className={cellClass}>
              <span className="text-ink-soft @3xl/clinic:hidden">Second factor: </span>
              {person.hasSecondFactor ? 'Set up' : 'None yet'}
            </td>
            <td className={`${cellClass} whitespace-nowrap`}>
              <span className="text-ink-soft @3xl/clinic:hidden">Last active: </span>
              {person.lastActivityAt === null
                ? 'never'
                : formatMoment(person.lastActivityAt, nowMs, timeZone)}
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
