import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { reasonField } from '#shared/accounts/fields.ts';
import { usePageHeading } from '#src/app/page-heading.ts';
import { Refused } from '#src/app/Refused.tsx';
import { Button } from '#src/components/Button.tsx';
import { PageHeader } from '#src/components/PageHeader.tsx';
import { TextArea } from '#src/components/TextArea.tsx';
import { showFieldErrors } from '#src/lib/form-errors.ts';
import { schemaResolver } from '#src/lib/schema-resolver.ts';
import { useOpenChart } from './queries.ts';

const schema = z.strictObject({ reason: reasonField });

type Values = z.output<typeof schema>;

/** Before a chart outside one's care teams. What is written here is for the patient's eyes. */
export function ReasonNeeded({ patientId }: { patientId: string }) {
  const heading = usePageHeading('Outside your care teams');
  const open = useOpenChart(patientId);
  const { register, handleSubmit, setError, formState } = useForm<Values>({
    resolver: schemaResolver(schema),
    defaultValues: { reason: '' },
  });
  return (
    <form
      noValidate
      className="grid max-w-2xl gap-5"
      onSubmit={(event) =>
        void handleSubmit(({ reason }) =>
          open.mutate(reason, { onError: (error) => showFieldErrors(error, setError) }),
        )(event)
      }
    >
      <PageHeader
        headingRef={heading}
        title="Outside your care teams"
        detail="You are not on this patient’s care team. You may open the chart all the same; say why."
      />
      <TextArea
        {...register('reason')}
        label="Why do you open this chart?"
        hint="The patient reads this, with your name and the time. It holds for 12 hours."
        error={formState.errors.reason?.message}
        dir="auto"
      />
      <Refused error={open.error} />
      <div>
        <Button type="submit" busy={open.isPending}>
          Open the chart
        </Button>
      </div>
    </form>
  );
}
