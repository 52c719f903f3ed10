import { MailX } from 'lucide-react';
import { Link } from 'react-router-dom';
import type { PatientLine } from '#shared/patients/contract.ts';
import { Tag } from '#src/components/Tag.tsx';
import { comingWords } from '#src/lib/invitation-words.ts';
import { PatientRowMenu } from './PatientRowMenu.tsx';
import { recordPlace } from './patient-places.ts';
import { backWords, dayWords, stateTones, stateWords } from './words.ts';

type Props = {
  patients: PatientLine[];
  /** Administrators see names and states, and open no record. */
  mayOpen: boolean;
  nowMs: number;
  timeZone: string;
};

const cellClass = 'py-3 pr-4 align-top @max-3xl/clinic:block @max-3xl/clinic:py-0 @max-3xl/clinic:pr-12';
const headClass = 'py-2 pr-4 text-left text-sm font-bold text-ink-soft';

/** A row a patient; where there is no room for columns, the cells of a row stand under each other. */
export function PatientTable({ patients, mayOpen, nowMs, timeZone }: Props) {
  return (
    <table className="w-full border-collapse text-[0.9375rem]">
      <caption className="sr-only">Patients</caption>
      <thead className="border-b border-wire @max-3xl/clinic:sr-only">
        <tr>
          <th scope="col" className={headClass}>
            Patient
          </th>
          <th scope="col" className={headClass}>
            Day
          </th>
          <th scope="col" className={headClass}>
            State
          </th>
          <th scope="col" className={headClass}>
            Lead
          </th>
          <th scope="col" className={headClass}>
            Way in
          </th>
          <th scope="col" className="w-target">
            <span className="sr-only">More</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {patients.map((patient) => {
          const coming = comingWords(patient, nowMs, timeZone);
          const back = backWords(patient);
          return (
            <tr
              key={patient.id}
              className="relative border-b border-wire last:border-b-0 hover:bg-paper @max-3xl/clinic:block @max-3xl/clinic:py-3"
            >
              <th scope="row" className={`${cellClass} text-left font-bold`}>
                {mayOpen ? (
                  <Link
                    to={recordPlace(patient.id)}
                    className="inline-block py-0.5 wrap-anywhere underline-offset-3 hover:underline"
                  >
                    {patient.name}
                  </Link>
                ) : (
                  <span className="wrap-anywhere">{patient.name}</span>
                )}
                <span className="block text-sm font-normal text-ink-soft">Chart {patient.chartNumber}</span>
              </th>
              <td className={`${cellClass} whitespace-nowrap`}>{dayWords(patient)}</td>
              <td className={cellClass}>
                <Tag tone={stateTones[patient.state]}>
                  {stateWords[patient.state]}
                  {back === null ? null : `, ${back}`}
                </Tag>
              </td>
              <td className={`${cellClass} wrap-anywhere`}>
                <span className="text-ink-soft @3xl/clinic:hidden">Lead </span>
                {patient.leadName ?? 'no lead'}
                {patient.mine ? <span className="text-ink-soft"> · mine</span> : null}
              </td>
              <td className={cellClass}>
                {coming}
                {patient.emailBounced ? (
                  <span className="flex items-start gap-1.5 font-bold text-clay">
                    <MailX className="mt-0.5 size-4 shrink-0" aria-hidden />
                    Mail came back
                  </span>
                ) : null}
              </td>
              <td className="w-target align-top @max-3xl/clinic:absolute @max-3xl/clinic:top-2 @max-3xl/clinic:right-0">
                {patient.state === 'ended' ? null : <PatientRowMenu patient={patient} nowMs={nowMs} />}
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}
