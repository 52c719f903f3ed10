import { createHash } from 'node:crypto';

/** Everything that the demo draws follows from this word: another word gives another clinic. */
const seed = 'orchard-lane-1';

/** Numbers that look random and are the same on every run. */
export type Random = {
  /** From 0 up to, not with, 1. */
  next: () => number;
  /** A whole number between the two, both included. */
  int: (from: number, to: number) => number;
  chance: (probability: number) => boolean;
  pick: <T>(items: readonly [T, ...T[]]) => T;
  /** Roughly normal, mean 0 and deviation 1: the sum of twelve uniform draws less six. */
  normal: () => number;
};

const digestOf = (...parts: readonly (string | number)[]): Buffer =>
  createHash('sha256')
    .update([seed, ...parts].join('\n'))
    .digest();

/**
 * A stream of its own for each name, so that a person added or taken away changes nobody else's history. The
 * generator is mulberry32: 32 bits of state, good enough to look like life.
 */
export const randomFor = (...name: readonly (string | number)[]): Random => {
  let state = digestOf('random', ...name).readUInt32LE(0);
  const next = (): number => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
  const int = (from: number, to: number): number => from + Math.floor(next() * (to - from + 1));
  return {
    next,
    int,
    chance: (probability) => next() < probability,
    pick: (items) => items[int(0, items.length - 1)] ?? items[0],
    normal: () => Array.from({ length: 12 }, next).reduce((sum, value) => sum + value, -6),
  };
};

/** The id of what the parts name: the same on every run, in the form of a random UUID. */
export const idOf = (...parts: readonly (string | number)[]): string => {
  const bytes = digestOf('id', ...parts).subarray(0, 16);
  bytes.writeUInt8((bytes.readUInt8(6) & 0x0f) | 0x40, 6);
  bytes.writeUInt8((bytes.readUInt8(8) & 0x3f) | 0x80, 8);
  return bytes.toString('hex').replace(/^(.{8})(.{4})(.{4})(.{4})(.{12})$/, '$1-$2-$3-$4-$5');
};
