import { takeoffCutList, type CutTakeoff } from '@kerfyard/common/cutting';
import { splitByLargestRemainder } from '@kerfyard/common/money';
import type { PricedBid } from '@kerfyard/common/bids';
import type { CutLine } from '@kerfyard/common/scopes';
import { cutWords } from '../subcontracts/cut.words.en.ts';

/** One line of a schedule of values before it has an id. */
export interface SovRow {
  description: string;
  cutIds: string[];
  amountCents: number;
}

/**
 * The schedule of values of an awarded bid: a row per cut and, where it is charged on top, a row for mobilization.
 * Rows sum to the bid's total exactly. A lump (a bid without lines) is split over the cuts by their work; what a
 * minimum adds to a bid by lines is split by the lines' own cents. No row is worth nothing, since a line without money could never be set
 * aside: a cut that comes to zero cents joins the row that is worth most.
 * @throws RangeError when the lines of the bid come to more than its total
 */
export function scheduleOfValues(
  cuts: readonly CutLine[],
  priced: Pick<PricedBid, 'totalCents' | 'lines' | 'mobilizationCents'>,
): SovRow[] {
  const own = cuts.map((line) =>
    sumOf(priced.lines.filter((row) => row.cutId === line.id).map((row) => row.cents)),
  );
  const rest = priced.totalCents - priced.mobilizationCents - sumOf(own);
  if (rest < 0) throw new RangeError('the lines of the bid come to more than its total');
  const added = splitByLargestRemainder(rest, sumOf(own) > 0 ? own : workOf(cuts));
  const rows = cutRows(
    cuts,
    own.map((cents, index) => cents + (added[index] ?? 0)),
  );
  return fold([...rows, { description: 'Mobilization', cutIds: [], amountCents: priced.mobilizationCents }]);
}

function cutRows(cuts: readonly CutLine[], cents: readonly number[]): SovRow[] {
  return cuts.map((line, index) => ({
    description: cutWords(line),
    cutIds: [line.id],
    amountCents: cents[index] ?? 0,
  }));
}

/** Rows worth nothing give their cuts to the most valuable row, the earliest of equals. */
function fold(rows: SovRow[]): SovRow[] {
  const largest = rows.reduce((best, row) => (row.amountCents > best.amountCents ? row : best));
  const empty = rows.filter((row) => row.amountCents === 0 && row !== largest);
  largest.cutIds.push(...empty.flatMap((row) => row.cutIds));
  const joined = empty.filter((row) => row.cutIds.length > 0);
  if (joined.length > 0) {
    largest.description = [largest.description, ...joined.map((row) => row.description)]
      .join(' · ')
      .slice(0, 500);
  }
  return rows.filter((row) => !empty.includes(row));
}

// Common practice, no source: middle of the engine's production ranges for sawing; cores by diameter, with set-up.
const sawInchFeetPerMinute = 7.5;
const wireSqFtPerMinute = 16.5 / 60;
const minutesPerPiece = 2;
const coreSetUpMinutes = 10;
const coreInchesPerMinute: readonly { upToIn: number; rate: number }[] = [
  { upToIn: 3, rate: 1 },
  { upToIn: 6, rate: 0.8 },
  { upToIn: Infinity, rate: 0.5 },
];

/** Minutes of work in each cut: the common measure in which saw lines and cores can share one lump. */
function workOf(cuts: readonly CutLine[]): number[] {
  return takeoffCutList({ cuts: cuts.map((line) => line.cut) }).cuts.map(
    (takeoff) => sawMinutes(takeoff) + coreMinutes(takeoff),
  );
}

/** A wire cut is measured by its face; pipes and bars, which have no depth of saw cut, by the piece. */
function sawMinutes({ kind, inchFeet, sawSqFt, pieceCuts }: CutTakeoff): number {
  if (kind === 'wire') return sawSqFt / wireSqFtPerMinute;
  return inchFeet > 0 ? inchFeet / sawInchFeetPerMinute : pieceCuts * minutesPerPiece;
}

function coreMinutes(takeoff: CutTakeoff): number {
  return sumOf(
    takeoff.cores.map(({ diameterIn, holes, coreInches }) => {
      const rate = coreInchesPerMinute.find((row) => (diameterIn ?? 0) <= row.upToIn)?.rate ?? 1;
      return holes * coreSetUpMinutes + coreInches / rate;
    }),
  );
}

const sumOf = (cents: readonly number[]): number => cents.reduce((a, b) => a + b, 0);
