/** The files of words of the check-in and of the cautions, which must be there before the first question. */
export const checkInWords = ['check-in', 'check-in-screens', 'rules', 'plan-details'] as const;
