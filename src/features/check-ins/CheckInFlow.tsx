import { useEffect, useRef } from 'react';
import { useTranslation } from 'react-i18next';
import { isAnswered } from '#shared/check-ins/answering.ts';
import { screensFor, secondsLeft } from '#shared/check-ins/walk.ts';
import { useControlsSide } from '#src/app/free-hand.ts';
import { useDocumentTitle } from '#src/app/page-heading.ts';
import { CautionScreen } from './CautionScreen.tsx';
import { findingsOf, seriousOf } from './danger-watch.ts';
import { DoneScreen } from './DoneScreen.tsx';
import type { CheckInDraft } from './draft.ts';
import { Question } from './Question.tsx';
import { QuestionFrame } from './QuestionFrame.tsx';
import { Review } from './Review.tsx';
import { SendFooter } from './SendFooter.tsx';
import { SendFailureBanner } from './SendFailureBanner.tsx';
import { useCheckIn } from './use-check-in.ts';
import { answerWords, questionWords, usualWords } from './words.ts';

/** One question after the other, the caution over them when one is due, and what happens next at the end. */
export function CheckInFlow({ start, firstName }: { start: CheckInDraft; firstName: string }) {
  const { t } = useTranslation(['check-in-screens', 'check-in', 'plan-details']);
  const checkIn = useCheckIn(start);
  const { draft, screen, me } = checkIn;
  const { answers, context, mode, caution } = draft;
  const side = useControlsSide();
  const heading = useRef<HTMLHeadingElement>(null);
  const title = screen ? questionWords(t, screen, context) : '';
  useDocumentTitle(t(`title.${mode}`));
  const screenId = screen?.id;
  useEffect(() => {
    heading.current?.focus({ preventScroll: true });
  }, [screenId, caution]);

  const findings = findingsOf(answers, context);
  const serious = seriousOf(findings);
  if (caution && serious.length > 0) {
    return (
      <CautionScreen
        key={caution.alertId}
        findings={serious}
        clinic={me.clinic}
        mode={mode}
        alertId={caution.alertId}
        entry={checkIn.alerts.find(({ alert }) => alert.id === caution.alertId)}
        onMistake={checkIn.mistaken}
        onGoOn={checkIn.closeCaution}
      />
    );
  }
  if (checkIn.receipt) {
    return (
      <DoneScreen receipt={checkIn.receipt} findings={findings} firstName={firstName} clinic={me.clinic} />
    );
  }
  if (!screen) return null;

  const screens = screensFor(answers, context, mode);
  const last = screen.kind === 'note' ? null : screens.find(({ id }) => id === draft.lastAt);
  const justDone = last
    ? {
        words:
          usualWords(t, last, answers, context) ??
          t('answered', { answer: answerWords(t, last, answers, context) ?? '' }),
        onUndo: () => checkIn.undo(last),
      }
    : checkIn.takenBack
      ? { words: t('caution.takenBack'), onUndo: null }
      : null;
  return (
    <QuestionFrame
      title={title}
      hint={screen.hintKey ? t(screen.hintKey, { crisisNumber: me.clinic.crisisNumber }) : undefined}
      headingRef={heading}
      progress={{
        current: screens.indexOf(screen) + 1,
        total: screens.length,
        seconds: secondsLeft(screen.id, answers, context, mode),
      }}
      side={side}
      emergencyNumber={me.clinic.emergencyNumber}
      justDone={justDone}
      onNext={screen.kind !== 'note' && isAnswered(screen, answers) ? checkIn.goOn : null}
      onBack={checkIn.goBack}
      backLeaves={checkIn.isFirst}
      footer={
        screen.kind === 'note' ? (
          <SendFooter
            onSend={checkIn.send}
            sending={checkIn.post.isPending}
            failure={
              checkIn.post.error && !checkIn.post.isPending ? (
                <SendFailureBanner
                  error={checkIn.post.error}
                  onFix={checkIn.change}
                  onSendAsNew={checkIn.sendAsNew}
                />
              ) : null
            }
          />
        ) : null
      }
    >
      {screen.kind === 'note' ? (
        <Review
          draft={draft}
          side={side}
          onNote={(note) => checkIn.answer({ ...answers, note }, false)}
          onChange={checkIn.change}
        />
      ) : (
        <Question
          key={screen.id}
          screen={screen}
          label={title}
          answers={answers}
          context={context}
          side={side}
          onAnswer={checkIn.answer}
        />
      )}
    </QuestionFrame>
  );
}
