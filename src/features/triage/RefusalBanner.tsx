import { Banner } from '#src/components/Banner.tsx';
import { refusalOf } from './refusals.ts';

type Props = {
  error: Error | null;
  /** What became of what was typed. */
  kept?: string;
};

/** Says why a move did not happen; nothing while there is nothing to say. */
export function RefusalBanner({ error, kept }: Props) {
  if (!error) return null;
  const { title, detail } = refusalOf(error, kept);
  return (
    <Banner tone="warning" title={title} announce="alert">
      {detail}
    </Banner>
  );
}
