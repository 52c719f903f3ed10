import type { PatientRecord } from '#shared/patients/contract.ts';
import { FactList } from '#src/components/FactList.tsx';
import { SectionHeading } from '#src/components/SectionHeading.tsx';
import { formatDateAndYear, telephoneHref } from '#src/lib/format.ts';
import {
  approachWords,
  bicepsWords,
  blockWords,
  consentWords,
  procedureWords,
  sideWords,
  subscapularisWords,
} from './words.ts';

const notRecorded = 'Not recorded';

export function IdentityFacts({ record: { identity } }: { record: PatientRecord }) {
  return (
    <section>
      <SectionHeading wire>Identity</SectionHeading>
      <FactList
        facts={[
          { label: 'Date of birth', value: formatDateAndYear(identity.birthDate) },
          {
            label: 'Telephone',
            value: (
              <a href={telephoneHref(identity.phone)} className="font-bold underline underline-offset-3">
                {identity.phone}
              </a>
            ),
          },
          { label: 'E-mail', value: <span className="wrap-anywhere">{identity.email}</span> },
          { label: 'Address', value: identity.address },
          { label: 'Time zone', value: identity.timeZone },
          { label: 'Dominant hand', value: sideWords[identity.dominantHand] },
          { label: 'Main medicines', value: identity.mainMedicines ?? notRecorded },
          { label: 'Equipment at home', value: identity.equipmentAtHome ?? notRecorded },
        ]}
      />
    </section>
  );
}

export function OperationFacts({ record: { operation } }: { record: PatientRecord }) {
  return (
    <section>
      <SectionHeading wire>Operation card</SectionHeading>
      <FactList
        facts={[
          { label: 'Procedure', value: procedureWords[operation.procedure] },
          { label: 'Operated arm', value: sideWords[operation.arm] },
          { label: 'Date of surgery', value: formatDateAndYear(operation.surgeryDate) },
          { label: 'Surgeon', value: operation.surgeon },
          { label: 'Approach', value: approachWords[operation.approach] },
          { label: 'Subscapularis', value: subscapularisWords[operation.subscapularis] },
          { label: 'Biceps', value: bicepsWords[operation.biceps] },
          { label: 'Tuberosity', value: operation.tuberosity ?? 'Does not apply' },
          { label: 'Limits set in theatre', value: operation.limits ?? 'None recorded' },
          { label: 'Nerve block', value: blockWords[operation.block] },
          { label: 'Dressing stays until', value: `Day ${operation.dressingUntilDay}` },
        ]}
      />
    </section>
  );
}

export function TeamFacts({ record: { careTeam, consent } }: { record: PatientRecord }) {
  return (
    <section>
      <SectionHeading wire>Care team and consent</SectionHeading>
      <FactList
        facts={[
          ...careTeam.map(({ personId, name, credential, isLead }) => ({
            key: personId,
            label: isLead ? 'Lead therapist' : 'On the team',
            value: credential === null ? name : `${name}, ${credential}`,
          })),
          {
            key: 'consent',
            label: 'Consent',
            value: consent
              ? `${consentWords[consent.how]}, ${formatDateAndYear(consent.on)}${
                  consent.recordedBy === null ? '' : `, recorded by ${consent.recordedBy}`
                }`
              : notRecorded,
          },
        ]}
      />
    </section>
  );
}
