import { ChevronDown, ChevronUp } from 'lucide-react';
import { useId, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { chooseAlone, tickedIn, toggle } from '#shared/check-ins/answering.ts';
import type { Answers } from '#shared/check-ins/answers.ts';
import type { CheckInContext } from '#shared/check-ins/contract.ts';
import type { Choice, Tile, TilesScreen } from '#shared/check-ins/screens.ts';
import { choicesFor } from '#shared/check-ins/walk.ts';
import { CheckTile } from '#src/components/CheckTile.tsx';
import { classNames } from '#src/components/class-names.ts';
import { AloneButton } from './AloneButton.tsx';

type Props = {
  screen: TilesScreen;
  label: string;
  answers: Answers;
  context: CheckInContext;
  onAnswer: (answers: Answers, advance: boolean) => void;
};

/** Five groups of symptoms, each opening its list in its place; "none of these" after them. */
export function SymptomTiles({ screen, label, answers, context, onAnswer }: Props) {
  const ticked = tickedIn(screen, answers);
  return (
    <div role="group" aria-label={label} className="grid gap-2.5">
      {screen.tiles.map((tile) => (
        <TileGroup
          key={tile.code}
          tile={tile}
          choices={choicesFor(tile.choices, context)}
          ticked={ticked}
          onToggle={(code) => onAnswer(toggle(screen, answers, code), false)}
        />
      ))}
      <AloneButton
        alone={screen.alone}
        picked={answers.symptomsNone === true}
        disabled={ticked.length > 0}
        onPick={() => onAnswer(chooseAlone(screen, answers), true)}
      />
    </div>
  );
}

type GroupProps = {
  tile: Tile;
  choices: readonly Choice[];
  ticked: readonly string[];
  onToggle: (code: string) => void;
};

function TileGroup({ tile, choices, ticked, onToggle }: GroupProps) {
  const { t } = useTranslation(['check-in-screens', 'check-in']);
  const count = choices.filter(({ code }) => ticked.includes(code)).length;
  // A group with something ticked is open when one comes back to it.
  const [open, setOpen] = useState(count > 0);
  const listId = useId();
  const Arrow = open ? ChevronUp : ChevronDown;
  return (
    <div
      className={classNames(
        'rounded border bg-sheet',
        count > 0 ? 'border-leaf ring-1 ring-leaf' : 'border-wire-strong',
      )}
    >
      <button
        type="button"
        aria-expanded={open}
        aria-controls={listId}
        onClick={() => setOpen(!open)}
        className="flex min-h-15 w-full items-center gap-3 rounded px-4 py-2.5 text-left leading-snug hover:bg-leaf-wash"
      >
        <span className="min-w-0 grow">
          <span className="block font-bold">{t(`check-in:tiles.${tile.code}.title`)}</span>
          <span className="block text-sm text-ink-soft">{t(`check-in:tiles.${tile.code}.examples`)}</span>
        </span>
        {count > 0 ? (
          <span className="shrink-0 text-sm font-bold text-leaf-deep">{t('tiles.ticked', { count })}</span>
        ) : null}
        <Arrow className="size-6 shrink-0 text-ink-soft" aria-hidden />
      </button>
      <div id={listId} hidden={!open} className="px-2.5 pb-2.5">
        <div className="grid gap-2">
          {choices.map(({ code, textKey }) => (
            <CheckTile
              key={code}
              label={t(textKey)}
              checked={ticked.includes(code)}
              onChange={() => onToggle(code)}
            />
          ))}
        </div>
      </div>
    </div>
  );
}
