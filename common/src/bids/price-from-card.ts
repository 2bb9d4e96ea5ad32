import { methodsFor } from '../cutting/methods.ts';
import type { Method } from '../people/people.schema.ts';
import type { PriceFactor, RateCard, RateRow, RateUnit } from '../people/rate-card.schema.ts';
import type { CutData } from '../scopes/cut.schema.ts';
import { methodQuestion, reachNeededIn, type CutPlace } from '../scopes/methods-of-cuts.ts';
import type { ScopeBody } from '../scopes/scope.schema.ts';
import { bidUnitsOfKind } from './bid-units.ts';

/** A cut with the rate a crew's card has for it. */
export interface CardLine {
  cutId: string;
  method: Method;
  row: RateRow;
}

/** What a crew's card makes of a scope: rates for the cuts it knows, the marks of those it does not, and the rest. */
export interface CardPrice {
  lines: CardLine[];
  unpriced: string[];
  factors: Record<PriceFactor, number | null>;
  minimumCents: number;
  mobilizationCents: number;
  minimumIncludesMobilization: boolean;
}

/** What of a scope the card is held against. */
export type CardScope = Pick<ScopeBody, 'cuts' | 'conditions'>;

/**
 * Methods that can do a cut here, the usual one first: the engine's order, but joints by a joint saw.
 * @param offered the crew's own methods; empty stands for all
 */
export function methodsOfCutHere(cut: CutData, place: CutPlace, offered: readonly Method[] = []): Method[] {
  const able = methodsFor(methodQuestion(cut, place))
    .filter(({ ok, method }) => ok && (offered.length === 0 || offered.includes(method)))
    .map(({ method }) => method);
  return able.includes('joint_saw') ? ['joint_saw', ...able.filter((one) => one !== 'joint_saw')] : able;
}

/** What decides a cut's band on a rate card, inches: the diameter of cores, otherwise how deep a tool must reach. */
export function bandSizeIn(cut: CutData): number {
  if (cut.kind === 'core') return cut.diameterIn;
  return cut.kind === 'stitch' ? cut.bitDiameterIn : reachNeededIn(cut);
}

/**
 * The rate of a card for a cut done by a method and sold by a unit: the narrowest band that holds it, a rate for
 * this kind of cut before one for every kind. Undefined where the card has none.
 */
export function rateFor(
  card: Pick<RateCard, 'rates'>,
  { cut, method, unit }: { cut: CutData; method: Method; unit: RateUnit },
): RateRow | undefined {
  const size = bandSizeIn(cut);
  const fitting = card.rates.filter(
    (row) =>
      row.method === method &&
      row.unit === unit &&
      (row.kind === null || row.kind === cut.kind) &&
      size <= (row.upToIn ?? Infinity),
  );
  return fitting.sort(
    (a, b) =>
      Number(a.kind === null) - Number(b.kind === null) || (a.upToIn ?? Infinity) - (b.upToIn ?? Infinity),
  )[0];
}

/**
 * Price a scope from a crew's card: each cut by the first method able to do it here for which the card has a rate, in
 * the unit its kind is usually sold by. Factors are those the conditions call for; the crew adds the others.
 * @param chosen methods the crew picked for single cuts, before all others
 */
export function priceFromCard(
  { cuts, conditions }: CardScope,
  card: RateCard,
  chosen: ReadonlyMap<string, Method> = new Map(),
): CardPrice {
  const lines: CardLine[] = [];
  const unpriced: string[] = [];
  for (const { id, mark, cut } of cuts) {
    const picked = chosen.get(id);
    const able = picked === undefined ? methodsOfCutHere(cut, conditions) : [picked];
    const found = firstRate(card, cut, able);
    if (found === undefined) unpriced.push(mark);
    else lines.push({ cutId: id, ...found });
  }
  const { minimumCents, mobilizationCents, minimumIncludesMobilization } = card;
  return {
    lines,
    unpriced,
    factors: factorsHere(card, conditions),
    minimumCents,
    mobilizationCents,
    minimumIncludesMobilization,
  };
}

function firstRate(
  card: RateCard,
  cut: CutData,
  able: readonly Method[],
): { method: Method; row: RateRow } | undefined {
  for (const method of able) {
    for (const unit of bidUnitsOfKind[cut.kind]) {
      const row = unit === 'lump' ? undefined : rateFor(card, { cut, method, unit });
      if (row !== undefined) return { method, row };
    }
  }
  return undefined;
}

/** A finished space and night work stand in no field of a scope: the crew adds those itself. */
function factorsHere(
  { factors }: RateCard,
  conditions: ScopeBody['conditions'],
): Record<PriceFactor, number | null> {
  return {
    heavy_bar: conditions.steel === 'heavy_bar' ? factors.heavy_bar : null,
    overhead: conditions.face === 'ceiling' ? factors.overhead : null,
    finished_space: null,
    night: null,
  };
}
