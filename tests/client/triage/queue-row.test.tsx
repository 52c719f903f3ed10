import { screen } from '@testing-library/react';
import { beforeAll, expect, it, vi } from 'vitest';
import { QueueRow } from '#src/features/triage/QueueRow.tsx';
import { noorSignedIn, showTo } from '../clinic/screen.tsx';
import { aRow, noor } from './flags.ts';

beforeAll(() => {
  Element.prototype.scrollIntoView = vi.fn();
});

const show = (calledMistakeAt: string | null) =>
  showTo(
    noorSignedIn,
    <ul>
      <QueueRow
        flag={aRow({ calledMistakeAt })}
        selected={false}
        isNew={false}
        meId={noor.personId}
        timeZone={noorSignedIn.clinic.timeZone}
        nowMs={Date.parse('2026-12-01T12:30:00.000Z')}
      />
    </ul>,
  );

it('a row keeps its reason and says beside it that the patient called a tick a mistake', async () => {
  await show('2026-12-01T07:08:00.000Z');
  expect(screen.getByText('Fall with injury')).toBeTruthy();
  expect(screen.getByText('The patient says: ticked by mistake, 02:08.')).toBeTruthy();
});

it('a row says nothing of a mistake where the patient said nothing', async () => {
  await show(null);
  expect(screen.queryByText(/ticked by mistake/)).toBeNull();
});
