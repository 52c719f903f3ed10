import type { ReactNode } from 'react';
import { classNames } from './class-names.ts';

export type TagTone = 'leaf' | 'bark' | 'clay' | 'ochre' | 'slate' | 'moss';

const tones: Record<TagTone, string> = {
  leaf: 'bg-leaf-wash text-leaf-deep',
  bark: 'bg-bark-wash text-bark',
  clay: 'bg-clay-wash text-clay',
  ochre: 'bg-ochre-wash text-ochre',
  slate: 'bg-slate-wash text-slate',
  moss: 'bg-moss-wash text-moss',
};

/** A state in a word or two; its colour only supports the word. */
export function Tag({ tone = 'slate', children }: { tone?: TagTone; children: ReactNode }) {
  return (
    <span
      className={classNames(
        'inline-block max-w-full rounded-sm border border-transparent px-2 py-0.5 text-[0.8125rem] leading-snug font-bold',
        tones[tone],
      )}
    >
      {children}
    </span>
  );
}
