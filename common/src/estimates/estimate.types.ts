import type { CrewHoursInput, GeneratorInput, ProductionMethod, WorkingStep } from '../cutting/index.ts';
import type { Method } from '../people/people.schema.ts';
import type { RateCard } from '../people/rate-card.schema.ts';
import type { CutPlace } from '../scopes/methods-of-cuts.ts';
import type { CutLine } from '../scopes/cut.schema.ts';

/** Hours of a job beside sawing and coring, which are computed. */
export type OtherHours = Omit<CrewHoursInput, 'sawingHours'>;

export interface EstimateInput {
  cuts: readonly CutLine[];
  place: CutPlace;
  /** How each cut is done; a cut without a method is not counted. */
  methods: ReadonlyMap<string, Method>;
  /** The crew's own numbers, which replace common practice; null before it has any. */
  card: RateCard | null;
  hours: OtherHours;
  /** What one truck carries away: the sooner of weight and room. */
  load: { tons: number; cuYd: number };
  /** The machine to be run from a generator; null where none is. */
  generator: GeneratorInput | null;
}

/** A figure between a quick job and a slow one; the same twice where only the crew's own numbers went in. */
export interface Spread {
  low: number;
  high: number;
  working: readonly WorkingStep[];
}

export interface EstimatedFigure {
  value: number;
  working: readonly WorkingStep[];
}

/** Work of one kind of tool. */
export interface ToolHours extends Spread {
  tool: ProductionMethod | 'core';
  quantity: number;
  unit: string;
}

/** Why something of a cut is not in the hours. */
export type NotCountedReason = 'no_method' | 'no_rate' | 'no_blade' | 'no_feed';

export interface JobEstimate {
  tools: ToolHours[];
  hours: Spread;
  /** Null where the card has no cost for it. */
  crewCents: Spread | null;
  bladeCents: EstimatedFigure | null;
  bitCents: EstimatedFigure | null;
  /** Of all costs the card knows; null while it knows none. */
  costCents: Spread | null;
  waterGal: Spread;
  drums: Spread;
  slurryLb: Spread;
  spoil: { tons: EstimatedFigure; looseCuYd: EstimatedFigure; loads: EstimatedFigure } | null;
  /** Where no engine may run and something is cut by hand. */
  batteryPacks: EstimatedFigure | null;
  generatorKw: EstimatedFigure | null;
  notCounted: { mark: string; reason: NotCountedReason }[];
}
