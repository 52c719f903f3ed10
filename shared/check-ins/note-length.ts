/** The longest note of a check-in, in a file of its own so that a field can know it without the schema. */
export const noteMaxCharacters = 4000;
