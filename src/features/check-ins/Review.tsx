import { useTranslation } from 'react-i18next';
import { noteMaxCharacters } from '#shared/check-ins/note-length.ts';
import type { Screen } from '#shared/check-ins/screens.ts';
import { screensFor } from '#shared/check-ins/walk.ts';
import { Banner } from '#src/components/Banner.tsx';
import { Button } from '#src/components/Button.tsx';
import { TextArea } from '#src/components/TextArea.tsx';
import { classNames } from '#src/components/class-names.ts';
import type { CheckInDraft } from './draft.ts';
import { unanswered } from './steps.ts';
import { answerWords, questionWords } from './words.ts';

type Props = {
  draft: CheckInDraft;
  side: 'left' | 'right';
  onNote: (note: string) => void;
  onChange: (screen: Screen) => void;
};

/** The counter appears when the end is near. */
const tellLeftBelow = 200;

/** Everything that was answered, each to be changed, before it is sent. */
export function Review({ draft, side, onNote, onChange }: Props) {
  const { t } = useTranslation(['check-in-screens', 'check-in', 'plan-details']);
  const { answers, context, mode } = draft;
  const screens = screensFor(answers, context, mode).filter(({ kind }) => kind !== 'note');
  const open = unanswered(draft).length;
  const left = noteMaxCharacters - (answers.note?.length ?? 0);
  return (
    <div className="grid grid-cols-1 gap-6">
      {open > 0 ? <Banner tone="warning">{t('review.unanswered', { count: open })}</Banner> : null}
      <TextArea
        label={t('review.note')}
        hint={left < tellLeftBelow ? t('review.left', { count: left }) : t('review.noteHint')}
        rows={2}
        maxLength={noteMaxCharacters}
        value={answers.note ?? ''}
        onChange={(event) => onNote(event.target.value)}
      />
      <section aria-labelledby="answers">
        <h2 id="answers" className="text-lg">
          {t('review.answers')}
        </h2>
        <ul>
          {screens.map((screen) => {
            const question = questionWords(t, screen, context);
            return (
              <li
                key={screen.id}
                className={classNames(
                  'flex flex-wrap items-center gap-x-3 border-b border-wire py-2 last:border-b-0',
                  side === 'left' && 'flex-row-reverse',
                )}
              >
                <div className="min-w-0 grow basis-48 leading-snug">
                  <p className="text-sm text-ink-soft">{question}</p>
                  <p className="font-bold">
                    {answerWords(t, screen, answers, context) ?? t('review.noAnswer')}
                  </p>
                </div>
                <Button
                  variant="quiet"
                  aria-label={t('review.changeWhat', { question })}
                  onClick={() => onChange(screen)}
                >
                  {t('review.change')}
                </Button>
              </li>
            );
          })}
        </ul>
      </section>
    </div>
  );
}
