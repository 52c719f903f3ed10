import { Check } from 'lucide-react';
import { Banner } from '#src/components/Banner.tsx';

/**
 * Says that something was kept. The live region is there before the words arrive in it; empty, it stands
 * outside the flow, where it takes no room.
 */
export function KeptNotice({ text }: { text: string | null }) {
  return (
    <div role="status" className={text === null ? 'absolute' : undefined}>
      {text === null ? null : <Banner icon={Check}>{text}</Banner>}
    </div>
  );
}
