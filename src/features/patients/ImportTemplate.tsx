import { Check, Copy } from 'lucide-react';
import { useState } from 'react';
import type { importColumns } from '#shared/patients/import-contract.ts';
import {
  approaches,
  arms,
  bicepsWays,
  blocks,
  consentWays,
  procedures,
  subscapularisWays,
} from '#shared/patients/record.ts';
import { Button } from '#src/components/Button.tsx';
import { templateRow } from './import-template.ts';

type Column = (typeof importColumns)[number];

const accepted: Partial<Record<Column, string>> = {
  birth_date: 'year-month-day',
  blood_thinner: 'its name, or “none”; empty where nobody has asked: then it counts as one',
  dominant_hand: arms.join(', '),
  procedure: procedures.join(', '),
  arm: arms.join(', '),
  surgery_date: 'year-month-day',
  approach: approaches.join(', '),
  subscapularis: subscapularisWays.join(', '),
  biceps: bicepsWays.join(', '),
  block: blocks.join(', '),
  dressing_until_day: 'a whole number of days',
  lead_email: 'the e-mail of the lead therapist at this clinic',
  consent_on: 'year-month-day',
  consent_how: consentWays.join(', '),
};

const cellClass = 'px-3 py-1 wrap-anywhere @max-3xl/clinic:block @max-3xl/clinic:py-0';

/** The columns of a list, and a row to copy into a spreadsheet. */
export function ImportTemplate({ columns }: { columns: readonly Column[] }) {
  const [copied, setCopied] = useState<'yes' | 'no' | null>(null);
  function copy() {
    const example = columns.map((column) => templateRow[column]);
    navigator.clipboard.writeText(`${columns.join('\t')}\n${example.join('\t')}`).then(
      () => setCopied('yes'),
      () => setCopied('no'),
    );
  }
  return (
    <details className="rounded border border-wire bg-paper px-4 py-2">
      <summary className="min-h-target cursor-pointer py-2.5 font-bold">
        The columns, and an example to copy
      </summary>
      <div className="grid gap-3 pb-3">
        <p className="text-sm text-ink-soft">
          The first row holds these names, in any order. Each row below it is a patient.
        </p>
        <div className="rounded border border-wire bg-sheet">
          <table className="w-full border-collapse text-left text-sm">
            <thead>
              <tr className="border-b border-wire @max-3xl/clinic:sr-only">
                <th scope="col" className="px-3 py-1.5">
                  Column
                </th>
                <th scope="col" className="px-3 py-1.5">
                  Example
                </th>
                <th scope="col" className="px-3 py-1.5">
                  What it takes
                </th>
              </tr>
            </thead>
            <tbody>
              {columns.map((column) => (
                <tr
                  key={column}
                  className="border-b border-wire last:border-b-0 @max-3xl/clinic:block @max-3xl/clinic:py-1"
                >
                  <th scope="row" className={`${cellClass} font-mono font-normal`}>
                    {column}
                  </th>
                  <td className={cellClass}>{templateRow[column]}</td>
                  <td className={`${cellClass} text-ink-soft`}>{accepted[column]}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </div>
        <div className="flex flex-wrap items-center gap-3">
          <Button variant="outline" icon={copied === 'yes' ? Check : Copy} onClick={copy}>
            Copy names and example
          </Button>
          <p role="status" className="text-sm">
            {copied === 'yes' ? 'Copied. Paste it into a spreadsheet.' : null}
            {copied === 'no' ? 'The browser did not allow it. Mark the names and copy them by hand.' : null}
          </p>
        </div>
      </div>
    </details>
  );
}
