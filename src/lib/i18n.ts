import i18next from 'i18next';
import { initReactI18next } from 'react-i18next';
import app from '#src/locales/en/app.json';

const languages = ['en'] as const;
type Language = (typeof languages)[number];

/**
 * Each file of words is a chunk of its own, loaded with the screens that need it; the shell's are always there.
 * The first load of Today knows where its own lie; the list of the others is fetched with the first of them.
 */
const filesOfToday = import.meta.glob<{ default: Record<string, unknown> }>('../locales/*/{today,plan}.json');

/** Starts with the words of the shell; `loadWords` brings the rest. */
export async function startI18n(): Promise<void> {
  // Starting twice would forget what was loaded in between.
  if (i18next.isInitialized) return;
  await i18next.use(initReactI18next).init({
    lng: 'en' satisfies Language,
    supportedLngs: languages,
    ns: ['app'],
    defaultNS: 'app',
    resources: { en: { app } },
    interpolation: { escapeValue: false },
    returnNull: false,
  });
}

/** Fetches files of words, each once. A failure rejects, as a missing chunk of code does. */
export async function loadWords(names: readonly string[]): Promise<void> {
  const language = i18next.language;
  await Promise.all(
    names
      .filter((name) => !i18next.hasResourceBundle(language, name))
      .map(async (name) => {
        const path = `../locales/${language}/${name}.json`;
        const load = filesOfToday[path] ?? (await import('./word-files.ts')).wordFiles[path];
        if (!load) throw new Error(`There are no words named "${name}" in "${language}".`);
        i18next.addResourceBundle(language, name, (await load()).default);
      }),
  );
}
