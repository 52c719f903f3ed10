import type { ComponentType } from 'react';
import { loadWords } from '#src/lib/i18n.ts';

/** A screen whose code and files of words are fetched together, when it is gone to. */
export const screen =
  (load: () => Promise<ComponentType>, words: readonly string[] = []) =>
  async () => {
    const [Component] = await Promise.all([load(), loadWords(words)]);
    return { Component };
  };
