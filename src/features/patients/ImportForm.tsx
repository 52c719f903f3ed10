import { useRef, useState } from 'react';
import { importColumns, importLimits } from '#shared/patients/import-contract.ts';
import { Refused } from '#src/app/Refused.tsx';
import { UnsavedGuard } from '#src/app/UnsavedGuard.tsx';
import { Button } from '#src/components/Button.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { TextArea } from '#src/components/TextArea.tsx';
import { ApiProblem } from '#src/lib/problem.ts';
import { ImportPreviewTable } from './ImportPreviewTable.tsx';
import { ImportTemplate } from './ImportTemplate.tsx';
import { EnrolAll } from './EnrolAll.tsx';
import { previewCounts } from './import-counts.ts';
import { useImportPatients, usePreviewImport } from './queries.ts';

function whatIsWrong(text: string): string | undefined {
  if (text.trim() === '') return 'Paste the list first.';
  return text.length > importLimits.characters ? 'The list is too long: enrol it in parts.' : undefined;
}

const fieldErrorOf = (error: Error | null): string | undefined =>
  error instanceof ApiProblem ? error.fieldErrors[0]?.message : undefined;

type Props = { onEnrolled: (enrolled: number, alreadyEnrolled: number) => void };

/**
 * A list is pasted, looked at, and enrolled whole or not at all. The text stays in its field until then: it is
 * put right there or in the spreadsheet it came from.
 */
export function ImportForm({ onEnrolled }: Props) {
  const preview = usePreviewImport();
  const enrol = useImportPatients();
  const [text, setText] = useState('');
  const [wrong, setWrong] = useState<string>();
  const previewHeading = useRef<HTMLHeadingElement>(null);
  // What was looked at is what is enrolled: a text that has changed since is to be looked at again.
  const looked = preview.variables === text ? preview.data : undefined;

  function look() {
    const found = whatIsWrong(text);
    setWrong(found);
    if (found !== undefined) return;
    preview.mutate(text, { onSuccess: () => previewHeading.current?.focus() });
  }
  return (
    <div className="grid gap-8">
      <ImportTemplate columns={importColumns} />
      <form
        noValidate
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault();
          if (!preview.isPending) look();
        }}
      >
        <TextArea
          label="The list"
          hint={`Paste it with its row of column names: from a spreadsheet, or as CSV. ${importLimits.rows} rows at most.`}
          rows={8}
          value={text}
          onChange={({ target }) => setText(target.value)}
          error={wrong ?? fieldErrorOf(preview.error)}
          spellCheck={false}
          autoComplete="off"
          wrap="off"
        />
        <Refused error={preview.error} />
        <div className="flex justify-end">
          <Button type="submit" variant={looked ? 'outline' : 'primary'} busy={preview.isPending}>
            {preview.data ? 'Look again' : 'Look at the list'}
          </Button>
        </div>
      </form>
      <section className={preview.data ? 'grid gap-4' : 'hidden'}>
        <div ref={previewHeading} tabIndex={-1}>
          <SectionHeading wire>What would happen</SectionHeading>
        </div>
        {preview.data && !looked ? (
          <p className="font-bold">The list has changed since it was looked at. Look again first.</p>
        ) : null}
        {preview.data ? <ImportPreviewTable preview={preview.data} /> : null}
        {looked ? (
          <EnrolAll
            counts={previewCounts(looked)}
            busy={enrol.isPending}
            onEnrol={(invite) =>
              enrol.mutate(
                { text, invite },
                { onSuccess: ({ enrolled, alreadyEnrolled }) => onEnrolled(enrolled, alreadyEnrolled) },
              )
            }
          />
        ) : null}
        {enrol.error ? (
          <>
            <Refused error={enrol.error} />
            <p role="alert" className="font-bold text-clay empty:hidden">
              {fieldErrorOf(enrol.error) ? `Nobody was enrolled. ${fieldErrorOf(enrol.error)}` : null}
            </p>
          </>
        ) : null}
      </section>
      <UnsavedGuard when={text.trim() !== ''} />
    </div>
  );
}
