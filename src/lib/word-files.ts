type WordFile = () => Promise<{ default: Record<string, unknown> }>;

/** Where every other file of words lies; fetched with the first of them. */
export const wordFiles: Record<string, WordFile> = import.meta.glob<{ default: Record<string, unknown> }>([
  '../locales/*/*.json',
  '!../locales/*/{app,today,plan}.json',
]);
