import { memo, useState } from 'react';
import type { ImportPreview } from '#shared/patients/import-contract.ts';
import { Banner } from '#src/components/Banner.tsx';
import { Checkbox } from '#src/components/Checkbox.tsx';
import { formatDate } from '#src/lib/format.ts';
import { countWords, previewCounts } from './import-counts.ts';

type Row = ImportPreview['rows'][number];

const isDate = (text: string): boolean => /^\d{4}-\d{2}-\d{2}$/.test(text);

const cellClass = 'py-2 pr-4 align-top @max-3xl/clinic:block @max-3xl/clinic:py-0';

/** Drawn once for a list, however long it is: the text above it changes with every key. */
export const ImportPreviewTable = memo(function ImportPreviewTable({ preview }: { preview: ImportPreview }) {
  const [onlyErrors, setOnlyErrors] = useState(false);
  const counts = previewCounts(preview);
  const rows = onlyErrors ? preview.rows.filter(({ errors }) => errors.length > 0) : preview.rows;
  return (
    <div className="grid gap-3">
      <p role="status" className="text-lg font-bold">
        {countWords(counts)}
      </p>
      {preview.problems.length > 0 ? (
        <Banner tone="warning" title="The list as a whole:">
          <ul>
            {preview.problems.map((problem) => (
              <li key={problem}>{problem}</li>
            ))}
          </ul>
        </Banner>
      ) : null}
      {counts.withErrors > 0 ? (
        <Checkbox
          label="Only rows with errors"
          checked={onlyErrors}
          onChange={({ target }) => setOnlyErrors(target.checked)}
        />
      ) : null}
      {rows.length === 0 ? null : (
        <table className="w-full border-collapse text-left text-[0.9375rem]">
          <caption className="sr-only">What would become of each row</caption>
          <thead>
            <tr className="border-b border-wire text-sm text-ink-soft @max-3xl/clinic:sr-only">
              {['Line', 'Name', 'Chart', 'Surgery', 'Lead', 'What happens'].map((label) => (
                <th key={label} scope="col" className={cellClass}>
                  {label}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr
                key={row.line}
                className="border-b border-wire last:border-b-0 @max-3xl/clinic:block @max-3xl/clinic:py-2"
              >
                <td className={`${cellClass} text-ink-soft`}>
                  <span className="@3xl/clinic:hidden">Line </span>
                  {row.line}
                </td>
                <th scope="row" className={`${cellClass} wrap-anywhere`}>
                  {row.name}
                </th>
                <td className={cellClass}>{row.chartNumber}</td>
                <td className={`${cellClass} whitespace-nowrap`}>
                  {isDate(row.surgeryDate) ? formatDate(row.surgeryDate) : row.surgeryDate}
                </td>
                <td className={`${cellClass} wrap-anywhere`}>{row.lead}</td>
                <td className={cellClass}>
                  <WhatHappens row={row} />
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </div>
  );
});

function WhatHappens({ row: { errors, alreadyEnrolled } }: { row: Row }) {
  if (alreadyEnrolled) return <span className="text-ink-soft">Already enrolled: left out</span>;
  if (errors.length === 0) return 'Ready';
  return (
    <ul className="grid gap-0.5 font-bold text-clay">
      {errors.map(({ column, message }) => (
        <li key={`${column} ${message}`}>
          <span className="font-mono font-normal">{column}</span> {message}
        </li>
      ))}
    </ul>
  );
}
