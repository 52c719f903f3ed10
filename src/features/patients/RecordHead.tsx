import { Pencil, Phone } from 'lucide-react';
import type { RefObject } from 'react';
import type { PatientRecord } from '#shared/patients/contract.ts';
import { LinkButton } from '#src/components/LinkButton.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { telephoneHref } from '#src/lib/format.ts';
import { editPlace } from './patient-places.ts';
import { ageOn, dayWords, procedureWords, sideWords } from './words.ts';

type Props = {
  record: PatientRecord;
  /** The date at the clinic. */
  today: string;
  headingRef: RefObject<HTMLHeadingElement | null>;
};

/** Who it is, where they are, and the two things done most: calling and changing. */
export function RecordHead({ record, today, headingRef }: Props) {
  const { identity, operation } = record;
  return (
    <PageHeader
      headingRef={headingRef}
      title={
        <span className="wrap-anywhere">
          {record.name}, {ageOn(identity.birthDate, today)}
        </span>
      }
      detail={`${sideWords[operation.arm]} ${procedureWords[operation.procedure].toLowerCase()} · ${dayWords(
        record,
      )} · ${operation.surgeon}`}
      actions={
        <>
          <LinkButton href={telephoneHref(identity.phone)} variant="outline" icon={Phone}>
            Call {identity.phone}
          </LinkButton>
          {record.state === 'ended' ? null : (
            <LinkButton to={editPlace(record.id)} variant="outline" icon={Pencil}>
              Change the record
            </LinkButton>
          )}
        </>
      }
    />
  );
}
