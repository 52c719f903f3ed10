/** The text under a key such as `rules:fall.title`, or null where there is none. */
export const textAt = (files: Readonly<Record<string, unknown>>, key: string): string | null => {
  const [file = '', path = ''] = key.split(':');
  const found = path
    .split('.')
    .reduce<unknown>(
      (node, part) => (node !== null && typeof node === 'object' ? Reflect.get(node, part) : undefined),
      files[file],
    );
  return typeof found === 'string' && found !== '' ? found : null;
};

/** Fills the gaps of a text as i18next does. */
export const filled = (text: string, values: Readonly<Record<string, string>>): string =>
  text.replaceAll(/\{\{(\w+)\}\}/g, (_, name: string) => values[name] ?? `{{${name}}}`);
