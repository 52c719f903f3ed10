import type { ReactNode } from 'react';

type DefinitionRow = { key: string; label: string; cells: ReactNode[] };

type Props = {
  /** What the table tells; shown only to those who hear it, since a heading stands above. */
  caption: string;
  /** One heading for each cell of a row; the column of labels has none. */
  columns: string[];
  rows: DefinitionRow[];
};

/** A few named things, each with the same few values. Where it is narrow the label takes a line of its own. */
export function DefinitionTable({ caption, columns, rows }: Props) {
  return (
    <div className="@container">
      <table className="w-full border-collapse text-left text-[0.9375rem]">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr className="border-b border-wire @max-md:flex">
            <td className="hidden @md:table-cell" />
            {columns.map((column) => (
              <th
                key={column}
                scope="col"
                className="py-1.5 pr-3 align-bottom text-sm font-bold text-ink-soft last:pr-0 @max-md:min-w-0 @max-md:flex-1"
              >
                {column}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr
              key={row.key}
              className="border-b border-wire last:border-b-0 @max-md:flex @max-md:flex-wrap @max-md:py-1.5"
            >
              <th
                scope="row"
                className="py-2 pr-3 font-normal @max-md:basis-full @max-md:py-0 @max-md:font-bold"
              >
                {row.label}
              </th>
              {row.cells.map((cell, index) => (
                <td
                  key={columns[index]}
                  className="py-2 pr-3 last:pr-0 @max-md:min-w-0 @max-md:flex-1 @max-md:py-1"
                >
                  {cell}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
