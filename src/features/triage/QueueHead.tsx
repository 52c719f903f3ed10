import type { ReactNode, RefObject } from 'react';
import { Link } from 'react-router-dom';
import type { FlagRow, MorningRound } from '#shared/triage/contract.ts';
import { classNames } from '#src/components/class-names.ts';
import { announcementOf, roundDate } from './words.ts';

type Props = {
  round: MorningRound | undefined;
  headingRef: RefObject<HTMLHeadingElement | null>;
  /** What has just come; announced, and shown as the way to it. */
  latest: readonly FlagRow[];
  /** A case is open: on a narrow screen it takes the place of all this but what is announced. */
  caseOpen: boolean;
};

/** The day, how many there are to see, and what has just come. */
export function QueueHead({ round, headingRef, latest, caseOpen }: Props) {
  const newest = latest[0];
  return (
    <div className="px-5 @4xl/clinic:pt-5">
      <div className={classNames('@max-4xl/clinic:pt-4', caseOpen && '@max-4xl/clinic:sr-only')}>
        <h1 ref={headingRef} tabIndex={-1} className="text-2xl leading-tight">
          {round ? (
            <>
              <span className="sr-only">Morning round, </span>
              {roundDate(round.date)}
            </>
          ) : (
            'Morning round'
          )}
        </h1>
        {round ? (
          <p className="mt-1 text-ink-soft">
            <strong className="text-ink">{round.flags.length} to see</strong>&nbsp;· {round.quiet} checked in
            quietly
          </p>
        ) : null}
      </div>
      {/* The live region stands empty until then, or what arrives in it is not announced. */}
      <p
        role="status"
        className={classNames('min-h-6 text-sm leading-6 font-bold', caseOpen && '@max-4xl/clinic:min-h-0')}
      >
        {newest ? (
          <NewsLink flagId={newest.id}>
            New: {announcementOf(newest)}
            {latest.length > 1 ? `, and ${latest.length - 1} more` : ''}
          </NewsLink>
        ) : null}
      </p>
    </div>
  );
}

function NewsLink({ flagId, children }: { flagId: string; children: ReactNode }) {
  return (
    <Link to={`/round/${flagId}`} className="text-leaf underline underline-offset-3 hover:text-leaf-deep">
      {children}
    </Link>
  );
}
