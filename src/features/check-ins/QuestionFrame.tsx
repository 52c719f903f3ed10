import { ArrowLeft, ArrowRight, History } from 'lucide-react';
import type { ReactNode, RefObject } from 'react';
import { useTranslation } from 'react-i18next';
import { BottomDock } from '#src/components/BottomDock.tsx';
import { Button } from '#src/components/Button.tsx';
import { EmergencyLine } from '#src/components/EmergencyLine.tsx';
import { IconButton } from '#src/components/IconButton.tsx';
import { ProgressSteps } from '#src/components/ProgressSteps.tsx';
import { classNames } from '#src/components/class-names.ts';
import { telephoneHref } from '#src/lib/format.ts';

type Props = {
  title: string;
  hint?: string;
  headingRef: RefObject<HTMLHeadingElement | null>;
  progress: { current: number; total: number; seconds: number };
  side: 'left' | 'right';
  emergencyNumber: string;
  /** What has just been done, such as the answer beside the person's usual, with the way to take it back. */
  justDone: { words: string; onUndo: (() => void) | null } | null;
  /** On when the question is answered by more than one press, or was answered before. */
  onNext: (() => void) | null;
  onBack: () => void;
  /** On the first question there is nothing to go back to but the page before. */
  backLeaves: boolean;
  /** What ends the check-in, at the foot where the thumb is. */
  footer?: ReactNode;
  children: ReactNode;
};

/** One question on a screen: where one stands, the question, the answers, and the emergency line. */
export function QuestionFrame(props: Props) {
  const { title, hint, headingRef, progress, side, emergencyNumber, justDone } = props;
  const { t } = useTranslation('check-in-screens');
  const { t: tCommon } = useTranslation();
  return (
    <div className="base-large flex min-h-dvh flex-col">
      <header className="mx-auto flex w-full max-w-xl items-center gap-1 px-3 pt-3">
        <IconButton
          icon={ArrowLeft}
          label={props.backLeaves ? t('leave') : tCommon('back')}
          onClick={props.onBack}
        />
        <ProgressSteps
          total={progress.total}
          current={progress.current}
          label={t('step', { current: progress.current, total: progress.total })}
          remaining={t('left', { seconds: progress.seconds })}
        />
      </header>
      <main className="mx-auto w-full max-w-xl grow px-5 pt-3 pb-6">
        <h1 ref={headingRef} tabIndex={-1} className="text-2xl leading-tight">
          {title}
        </h1>
        {hint ? <p className="mt-1 text-ink-soft">{hint}</p> : null}
        <div className="mt-4">{props.children}</div>
        {/* In the flow and not in the dock, which must leave room for "none of these" on a phone. */}
        <div
          className={classNames(
            justDone &&
              'mt-4 flex flex-wrap items-center gap-3 rounded bg-leaf-wash px-3 py-1.5 leading-snug',
            side === 'left' && 'flex-row-reverse',
          )}
        >
          {justDone ? <History className="size-6 shrink-0 text-leaf" aria-hidden /> : null}
          {/* The region stands from the start, or what arrives in it is not announced. */}
          <p role="status" className={classNames('min-w-0 grow', justDone && 'basis-40')}>
            {justDone?.words}
          </p>
          {justDone?.onUndo ? (
            <Button variant="outline" onClick={justDone.onUndo}>
              {t('undo')}
            </Button>
          ) : null}
        </div>
      </main>
      <BottomDock>
        {props.footer || props.onNext ? (
          <div className="bg-paper">
            <div className="mx-auto grid w-full max-w-xl gap-2.5 px-5 py-2">
              {props.footer}
              {props.onNext ? (
                <Button size="large" block iconAfter={ArrowRight} onClick={props.onNext}>
                  {t('next')}
                </Button>
              ) : null}
            </div>
          </div>
        ) : null}
        <EmergencyLine label={tCommon('emergency.label')} href={telephoneHref(emergencyNumber)}>
          {t('check-in-screens:emergency', { number: emergencyNumber })}
        </EmergencyLine>
      </BottomDock>
    </div>
  );
}
