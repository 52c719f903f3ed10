/** The zones that this browser knows, to choose from. Any other of the database can be typed all the same. */
export const timeZoneNames = (): string[] =>
  'supportedValuesOf' in Intl ? Intl.supportedValuesOf('timeZone') : [];
