import { hash, verify } from '@node-rs/argon2';
import { Problem } from '#shared/problems/problems.ts';

/**
 * Argon2id at OWASP's first recommended setting (19 MiB, 2 passes, 1 lane; Password Storage Cheat Sheet).
 * The algorithm is the library's default, argon2id.
 */
const cost = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

/** Passwords are compared in NFC, so that an accent typed on another keyboard is the same accent. */
const normalised = (password: string): string => password.normalize('NFC');

export const hashPassword = (password: string): Promise<string> => hash(normalised(password), cost);

/** A hash of nothing anybody knows, so that an unknown account costs exactly one verification too. */
const unknownAccountHash = hashPassword(crypto.randomUUID());

let running = 0;
const waiting: { from: string; go: () => void }[] = [];
const atOnce = 2;
/** A longer line than this would make everybody wait for whoever made it. */
const longestLine = 50;
/** So much of the line one visitor's address may take: nobody shuts the door for all others. */
const longestOfOne = 15;

/**
 * Exactly one verification, whether or not the account exists; two at a time at most, the rest in line. `from` is
 * the address that asks.
 */
export const verifyPassword = async (
  known: string | null,
  password: string,
  from = 'here',
): Promise<boolean> => {
  const own = waiting.filter((one) => one.from === from).length;
  if (waiting.length >= longestLine || own >= longestOfOne) throw new Problem('unavailable');
  if (running >= atOnce) await new Promise<void>((go) => waiting.push({ from, go }));
  running += 1;
  try {
    const matches = await verify(known ?? (await unknownAccountHash), normalised(password));
    return matches && known !== null;
  } finally {
    running -= 1;
    waiting.shift()?.go();
  }
};
