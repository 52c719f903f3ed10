import { ApiProblem, Unreachable } from './problem.ts';

/** Why something was not done, in a sentence, and what became of it. */
export type Refusal = { title: string; detail: string };

export function refusalOf(error: Error): Refusal {
  if (error instanceof ApiProblem) {
    const { reportId } = error.body;
    const report = error.code === 'internal' && reportId !== undefined ? `Report ${reportId}. ` : '';
    return { title: error.message, detail: `${report}Nothing was changed.` };
  }
  if (error instanceof Unreachable) {
    return {
      title: 'The server did not answer.',
      detail: 'It is not known whether this was kept. Try again: a repeat does no harm.',
    };
  }
  return { title: 'Something went wrong on this screen.', detail: 'Reload the page and try again.' };
}
