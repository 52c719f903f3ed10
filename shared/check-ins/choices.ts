import type { Choice } from './screens.ts';

/** The key of a text in the check-in's own file of words. */
export const text = (path: string): string => `check-in:${path}`;

/** Choices whose words stand under their screen's id. */
export const choicesOf = <Code extends string>(screenId: string, codes: readonly Code[]): Choice<Code>[] =>
  codes.map((code) => ({ code, textKey: text(`${screenId}.${code}`) }));

export const medicineCodes = ['yes', 'a-little', 'no', 'none-taken', 'not-sure'] as const;
export const medicineSeverity = ['yes', 'a-little', 'none-taken', 'not-sure', 'no'] as const;
export const yesNoNotSure = ['yes', 'no', 'not-sure'] as const;
export const noNotSureYes = ['no', 'not-sure', 'yes'] as const;
