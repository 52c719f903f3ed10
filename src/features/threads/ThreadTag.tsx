import { useTranslation } from 'react-i18next';
import type { ThreadState } from '#shared/threads/contract.ts';
import { Tag } from '#src/components/Tag.tsx';
import type { TagTone } from '#src/components/Tag.tsx';
import type { Side } from './seen-mark.ts';

const tones: Record<ThreadState, TagTone> = {
  'waiting-on-us': 'slate',
  'waiting-on-patient': 'moss',
  closed: 'bark',
};

/** Whose turn it is, in the words of the side that reads it. */
export function ThreadTag({ state, side }: { state: ThreadState; side: Side }) {
  const { t } = useTranslation('threads');
  return <Tag tone={tones[state]}>{t(`state.${side}.${state}`)}</Tag>;
}
