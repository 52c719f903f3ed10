import { compareUrgency, type Finding } from './findings.ts';

type Value = Finding['values'][string] | undefined;

/** Measured beside what was told: another number of these is no other thing to tell. */
const measured = new Set(['day', 'painNow', 'painWorst', 'usual']);

const isNothing = (value: Value): boolean =>
  value === undefined || value === null || value === false || value === '';

/** A list of signs includes another when it holds each of its signs. */
const includes = (has: Value, asked: Value): boolean =>
  isNothing(asked) ||
  has === asked ||
  (typeof has === 'string' &&
    typeof asked === 'string' &&
    asked.split(', ').every((sign) => has.split(', ').includes(sign)));

/** Whether the first finding says all that the second says, at least as urgently. */
export const covers = (first: Finding, second: Finding): boolean =>
  first.code === second.code &&
  compareUrgency(first.urgency, second.urgency) <= 0 &&
  Object.entries(second.values).every(
    ([key, value]) => measured.has(key) || includes(first.values[key], value),
  );

/**
 * What stands of findings that came one after the other, the earliest first: all but what another one says as
 * well. Of two that say the same the later stays. A milder answer later on takes nothing away.
 */
export const standingFindings = <F extends Finding>(found: readonly F[]): F[] =>
  found.filter(
    (finding, index) =>
      !found.some(
        (other, otherIndex) =>
          otherIndex !== index && covers(other, finding) && (otherIndex > index || !covers(finding, other)),
      ),
  );
