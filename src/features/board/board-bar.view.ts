import type { BoardBar } from '#shared/contracts/board.contract.ts';
import { layOutPhases, placeBarWords } from '#src/components/drawing/phase-bar.view.ts';
import { barPhases } from '#src/components/drawing/booking-bar.view.ts';
import { t } from '#src/texts/t.ts';

export type BarName = { readonly number: string; readonly words: string };

/** How a bar is named: its number, on its first row the cells too, or only that it is taken. */
export function nameBar(bar: BoardBar, bars: readonly BoardBar[]): BarName {
  const isFirst = bars.find(({ bookingId }) => bookingId === bar.bookingId) === bar;
  if (!bar.isVisible) {
    return { number: '', words: isFirst ? t.board.taken : '' };
  }
  const [number = '', ...words] = bar.title.split(' · ');
  return { number, words: isFirst ? words.join(' · ') : '' };
}

type Drawn = Pick<BoardBar, 'rowKey' | 'startAt' | 'endAt'>;

/**
 * When the next thing in the same row begins, so that words after one never run into it; null
 * where nothing follows.
 */
export function nextInRowMs(
  thing: Drawn,
  bars: readonly Drawn[],
  blocks: readonly Drawn[],
): number | null {
  const endMs = Date.parse(thing.endAt);
  const starts = [...bars, ...blocks]
    .filter(
      (each) => each.rowKey === thing.rowKey && each !== thing && Date.parse(each.endAt) > endMs,
    )
    .map((each) => Math.max(endMs, Date.parse(each.startAt)));
  return starts.length === 0 ? null : Math.min(...starts);
}

const letter = 6.4;
const gap = 10;
const markWidth = 30;

export type WordsAfter = { readonly number: string; readonly risk: string; readonly words: string };

/**
 * What is written behind a bar, as far as the room reaches: a risk with its reason, and the number
 * where the bar itself is too short for it.
 */
export function wordsAfter(
  bar: BoardBar,
  { number, words }: BarName,
  width: number,
  room: number,
): WordsAfter | undefined {
  const parts = layOutPhases(barPhases(bar.phases, bar.holdLikelyEndAt), width);
  const isInside = number !== '' && placeBarWords(parts, number, '') !== undefined;
  const plain = isInside ? '' : number;
  const wishes: WordsAfter[] = bar.isAtRisk
    ? riskWishes(bar, { number, words })
    : [
        { number: plain, risk: '', words: isInside ? '' : words },
        { number: plain, risk: '', words: '' },
      ];
  return wishes.find((wish) => wish.number + wish.risk + wish.words !== '' && fits(wish, room));
}

function riskWishes(bar: BoardBar, { number, words }: BarName): WordsAfter[] {
  const long = number === '' ? t.board.atRiskShort : t.board.numberAtRisk(number);
  return [
    { number: '', risk: long, words: words === '' ? '' : (bar.atRiskReason ?? '') },
    { number: '', risk: long, words: '' },
    { number, risk: '', words: '' },
  ];
}

function fits({ number, risk, words }: WordsAfter, room: number): boolean {
  const length = number.length + risk.length + words.length;
  return length * letter + gap + (risk === '' ? 0 : markWidth) <= room;
}
