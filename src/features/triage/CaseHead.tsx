import { ArrowLeft, Hand, Phone, Undo2 } from 'lucide-react';
import type { RefObject } from 'react';
import type { FlagCase } from '#shared/triage/contract.ts';
import { Button } from '#src/components/Button.tsx';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { telephoneHref } from '#src/lib/format.ts';
import { longOperation } from './words.ts';
import { UrgencySign } from './UrgencySign.tsx';

type Props = {
  flag: FlagCase;
  headingRef: RefObject<HTMLHeadingElement | null>;
  claim: { possible: boolean; busy: boolean; onClaim: () => void };
  release: { possible: boolean; busy: boolean; onRelease: () => void };
};

/** Who it is, where they are, and the two things that cannot wait: the telephone and the claim. */
export function CaseHead({ flag, headingRef, claim, release }: Props) {
  const { patient, person } = flag;
  return (
    <header>
      <div className="-ml-4 @4xl/clinic:hidden">
        <LinkButton to="/round" variant="quiet" icon={ArrowLeft}>
          Morning round
        </LinkButton>
      </div>
      <div className="flex flex-wrap items-start justify-between gap-x-6 gap-y-3">
        <div className="min-w-0 grow basis-60">
          <p className="mb-0.5 text-sm font-bold">
            <UrgencySign urgency={flag.urgency} />
          </p>
          <h2 ref={headingRef} tabIndex={-1} className="text-2xl leading-tight">
            {patient.name}, {person.age}
          </h2>
          <p className="mt-1 text-ink-soft first-letter:uppercase">
            {longOperation(patient)}&nbsp;· day {patient.day}, {person.phase} phase&nbsp;· {person.surgeon}
          </p>
          {flag.answeredBy ? (
            <p className="mt-1 font-bold">
              Answered by {flag.answeredBy.name}, {flag.answeredBy.relationship}
            </p>
          ) : null}
        </div>
        <div className="flex flex-wrap gap-3">
          <LinkButton href={telephoneHref(person.phone)} variant="outline" icon={Phone}>
            <span className="whitespace-nowrap">Call {person.phone}</span>
          </LinkButton>
          {claim.possible ? (
            <Button icon={Hand} busy={claim.busy} onClick={claim.onClaim}>
              Claim
            </Button>
          ) : null}
          {release.possible ? (
            <Button variant="outline" icon={Undo2} busy={release.busy} onClick={release.onRelease}>
              Release
            </Button>
          ) : null}
        </div>
      </div>
    </header>
  );
}
