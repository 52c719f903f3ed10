/** First letters of the first and the last word, by code point. */
function initialsOf(name: string): string {
  const words = name.trim().split(/\s+/u).filter(Boolean);
  const first = words[0];
  const last = words.length > 1 ? words[words.length - 1] : undefined;
  return [first, last]
    .map((word) => (word ? (Array.from(word)[0] ?? '') : ''))
    .join('')
    .toLocaleUpperCase();
}

type Props = {
  name: string;
  /** The name stands in words beside it, so that it need not be said twice. */
  decorative?: boolean;
};

export function Avatar({ name, decorative = false }: Props) {
  return (
    <span
      role={decorative ? undefined : 'img'}
      aria-label={decorative ? undefined : name}
      aria-hidden={decorative || undefined}
      className="inline-grid size-[2.125rem] shrink-0 place-items-center rounded-full bg-bark-wash text-sm font-black text-bark select-none"
    >
      {initialsOf(name)}
    </span>
  );
}
