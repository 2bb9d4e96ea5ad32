import { checkChoice, checkList, checkNumber, checkObject, within } from './check.ts';
import { CuttingInputError } from './input-error.ts';
import { arithmetic, put, type WorkingStep } from './working.ts';

export const bidAnswers = ['included', 'excluded', 'unclear'] as const;
export type BidAnswer = (typeof bidAnswers)[number];

/** A row of the tabulation: what the general contractor carries where a bid leaves it out. */
export interface TabulationRow {
  readonly id: string;
  readonly plugCents: number;
}

export interface TabulationBid {
  readonly id: string;
  readonly baseCents: number;
  /** By row id. A row without an answer is unclear. */
  readonly answers: Readonly<Record<string, BidAnswer>>;
}

export interface TabulatedBid {
  readonly id: string;
  readonly baseCents: number;
  readonly plugsCents: number;
  /** Rows neither included nor excluded; they are counted, not priced. */
  readonly unclear: number;
  readonly adjustedCents: number;
  readonly working: readonly WorkingStep[];
}

const maxRows = 1_000;
const maxBids = 1_000;
const centsRange = { min: 0, max: 100_000_000_000, integer: true, unit: 'cents' } as const;

/**
 * Bids made comparable: each excluded row adds its plug to the base. Sorted by adjusted total, then base, then id.
 * @throws CuttingInputError also for an answer to a row that does not exist, or a row id used twice
 */
export function tabulateBids(input: {
  readonly rows: readonly TabulationRow[];
  readonly bids: readonly TabulationBid[];
}): readonly TabulatedBid[] {
  const fields = checkObject(input, 'input');
  const plugs = checkRows(fields.rows);
  const bids = checkList(fields.bids, 'bids', maxBids).map((bid, index) =>
    within(`bids[${index}]`, () => tabulateBid(bid, plugs)),
  );
  return bids.sort(
    (left, right) =>
      left.adjustedCents - right.adjustedCents ||
      left.baseCents - right.baseCents ||
      (left.id < right.id ? -1 : 1),
  );
}

function checkRows(value: unknown): ReadonlyMap<string, number> {
  const plugs = new Map<string, number>();
  for (const [index, row] of checkList(value, 'rows', maxRows).entries()) {
    const fields = checkObject(row, `rows[${index}]`);
    const id = checkId(fields.id, `rows[${index}].id`);
    if (plugs.has(id)) {
      throw new CuttingInputError({ field: `rows[${index}].id`, allowed: 'used once', given: id });
    }
    plugs.set(id, checkNumber(fields.plugCents, `rows[${index}].plugCents`, centsRange));
  }
  return plugs;
}

function tabulateBid(bid: unknown, plugs: ReadonlyMap<string, number>): TabulatedBid {
  const fields = checkObject(bid, 'bid');
  const id = checkId(fields.id, 'id');
  const baseCents = checkNumber(fields.baseCents, 'baseCents', centsRange);
  const answers = checkAnswers(fields.answers, plugs);
  const excluded = [...plugs].filter(([rowId]) => answers.get(rowId) === 'excluded');
  const plugsCents = excluded.reduce((sum, [, plugCents]) => sum + plugCents, 0);
  const adjustedCents = baseCents + plugsCents;
  return {
    id,
    baseCents,
    plugsCents,
    unclear: [...plugs.keys()].filter((rowId) => (answers.get(rowId) ?? 'unclear') === 'unclear').length,
    adjustedCents,
    working: [
      {
        label: 'Adjusted',
        formula: 'base + plug of every excluded row',
        inputs: [
          put('base', baseCents, 'cents'),
          ...excluded.map(([rowId, plugCents]) => put(rowId, plugCents, 'cents')),
        ],
        value: adjustedCents,
        unit: 'cents',
        source: arithmetic,
      },
    ],
  };
}

function checkAnswers(value: unknown, plugs: ReadonlyMap<string, number>): ReadonlyMap<string, BidAnswer> {
  const answers = new Map<string, BidAnswer>();
  for (const [rowId, answer] of Object.entries(checkObject(value, 'answers'))) {
    if (!plugs.has(rowId)) {
      throw new CuttingInputError({
        field: `answers.${rowId}`,
        allowed: 'an answer to one of the rows',
        given: answer,
      });
    }
    answers.set(rowId, checkChoice(answer, `answers.${rowId}`, bidAnswers));
  }
  return answers;
}

function checkId(value: unknown, field: string): string {
  if (typeof value !== 'string' || value === '' || value.length > 200) {
    throw new CuttingInputError({ field, allowed: 'a text of 1 to 200 characters', given: value });
  }
  return value;
}
