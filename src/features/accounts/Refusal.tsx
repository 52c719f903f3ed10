import { Banner } from '#src/components/Banner.tsx';

/** The region stands from the start, or what arrives in it is not announced. */
export function Refusal({ text }: { text: string | null | undefined }) {
  return (
    <div role="alert" className="empty:hidden">
      {text ? <Banner tone="danger">{text}</Banner> : null}
    </div>
  );
}
