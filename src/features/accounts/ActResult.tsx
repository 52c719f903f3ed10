import { Banner } from '#src/components/Banner.tsx';
import { Refusal } from './Refusal.tsx';

type Props = { done: string | null; refusal: string | null };

/** What came of an act: said beside the place where it was begun, and aloud. */
export function ActResult({ done, refusal }: Props) {
  return (
    <>
      <Refusal text={refusal} />
      <div role="status" className="empty:hidden">
        {done && !refusal ? <Banner>{done}</Banner> : null}
      </div>
    </>
  );
}
