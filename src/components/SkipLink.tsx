type Props = { targetId: string; label: string };

/** The first stop of the keyboard: past the navigation, to what the page is for. */
export function SkipLink({ targetId, label }: Props) {
  return (
    <a
      href={`#${targetId}`}
      className="sr-only rounded bg-leaf font-bold text-sheet focus:not-sr-only focus:fixed focus:top-2 focus:left-2 focus:z-50 focus:px-4 focus:py-3"
    >
      {label}
    </a>
  );
}
