/**
 * How sure a table or formula is. `published`: read in the document named. `from memory`: the document is
 * named but its text was not at hand. `common practice`: what people in the trade use, without a source.
 */
export type Certainty = 'published' | 'from memory' | 'common practice';

/** Whose number a step used. `arithmetic` is geometry or a sum of what was put in, with nothing looked up. */
export type NumberOrigin = Certainty | 'company' | 'arithmetic';

/** Where the number of one step comes from. */
export interface WorkingSource {
  readonly origin: NumberOrigin;
  readonly document?: string;
  readonly section?: string;
  readonly edition?: string;
}

/** One number put into a formula. */
export interface WorkingInput {
  readonly name: string;
  readonly value: number | string;
  readonly unit: string;
}

/** One step of a calculation, so that a screen can open any figure down to formula, numbers and source. */
export interface WorkingStep {
  readonly label: string;
  readonly formula: string;
  readonly inputs: readonly WorkingInput[];
  readonly value: number | string;
  readonly unit: string;
  readonly source: WorkingSource;
}

/** Source of a step that only adds, multiplies or measures what was put in. */
export const arithmetic: WorkingSource = { origin: 'arithmetic' };

/** Source of a habit of the trade that no document backs. */
export const commonPractice: WorkingSource = { origin: 'common practice' };

/** Source of a number that the company entered in place of a common-practice one. */
export const companyNumber: WorkingSource = { origin: 'company' };

/** Short form for one number put in. */
export function put(name: string, value: number | string, unit: string): WorkingInput {
  return { name, value, unit };
}
