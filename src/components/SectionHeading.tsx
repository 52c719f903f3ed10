import type { ReactNode } from 'react';
import { Wire } from './Wire.tsx';

type Props = {
  children: ReactNode;
  id?: string;
  level?: 2 | 3;
  /** Draws the divider under the words. */
  wire?: boolean;
};

export function SectionHeading({ children, id, level = 2, wire = false }: Props) {
  const Heading = level === 2 ? 'h2' : 'h3';
  return (
    <div className="mb-2">
      <Heading id={id} className="mb-1 text-lg leading-snug">
        {children}
      </Heading>
      {wire ? <Wire /> : null}
    </div>
  );
}
