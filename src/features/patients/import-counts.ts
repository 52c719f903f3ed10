import type { ImportPreview } from '#shared/patients/import-contract.ts';

export type PreviewCounts = { ready: number; withErrors: number; alreadyEnrolled: number; problems: number };

export function previewCounts({ rows, ready, problems }: ImportPreview): PreviewCounts {
  return {
    ready,
    withErrors: rows.filter(({ errors, alreadyEnrolled }) => errors.length > 0 && !alreadyEnrolled).length,
    alreadyEnrolled: rows.filter(({ alreadyEnrolled }) => alreadyEnrolled).length,
    problems: problems.length,
  };
}

/** "12 ready, 2 with errors, 1 already enrolled". */
export function countWords({ ready, withErrors, alreadyEnrolled }: PreviewCounts): string {
  return [
    `${ready} ready`,
    withErrors > 0 ? `${withErrors} with errors` : null,
    alreadyEnrolled > 0 ? `${alreadyEnrolled} already enrolled` : null,
  ]
    .filter((part) => part !== null)
    .join(', ');
}
