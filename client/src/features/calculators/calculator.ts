import type { NumberRange, WorkingStep } from '@kerfyard/common/cutting';
import type { ReactNode } from 'react';

/**
 * How a calculator is described. A description names its fields, computes by the engine and lays out what it found;
 * the page, the address, the errors and the working are the same for all of them.
 */

/** A number as it is typed. Without `limit` the engine alone says what it takes. */
export interface NumberSpec<Optional extends boolean = boolean> {
  readonly kind: 'number';
  readonly unit: string;
  readonly initial: number | null;
  readonly limit: NumberRange | undefined;
  readonly optional: Optional;
}

/** One of a few; each has its words under `options.<name>`. */
export interface ChoiceSpec<Value extends string = string> {
  readonly kind: 'choice';
  readonly options: readonly Value[];
  readonly initial: Value;
}

/** Any of a few. */
export interface SetSpec<Value extends string = string> {
  readonly kind: 'set';
  readonly options: readonly Value[];
  readonly initial: readonly Value[];
}

/** Yes or no. */
export interface SwitchSpec {
  readonly kind: 'switch';
  readonly initial: boolean;
}

/** Numbers after one another, with commas between; none when left empty. */
export interface NumberListSpec {
  readonly kind: 'numbers';
  readonly unit: string;
}

export type ColumnSpec = NumberSpec | ChoiceSpec;
export type ColumnSpecs = Readonly<Record<string, ColumnSpec>>;

/** A short table the visitor fills: one row a task, a line, a mat. */
export interface RowsSpec<Columns extends ColumnSpecs = ColumnSpecs> {
  readonly kind: 'rows';
  readonly columns: Columns;
  readonly initial: readonly RawRow[];
  readonly minRows: number;
}

export type FieldSpec = NumberSpec | ChoiceSpec | SetSpec | SwitchSpec | NumberListSpec | RowsSpec;
export type FieldSpecs = Readonly<Record<string, FieldSpec>>;

export type ValueOf<Spec> =
  Spec extends RowsSpec<infer Columns>
    ? readonly { readonly [Name in keyof Columns]: ValueOf<Columns[Name]> }[]
    : Spec extends NumberSpec<infer Optional>
      ? Optional extends false
        ? number
        : number | undefined
      : Spec extends ChoiceSpec<infer Value>
        ? Value
        : Spec extends SetSpec<infer Value>
          ? readonly Value[]
          : Spec extends SwitchSpec
            ? boolean
            : readonly number[] | undefined;

export type ValuesOf<Fields extends FieldSpecs> = { readonly [Name in keyof Fields]: ValueOf<Fields[Name]> };

/** A row as typed: column name → text. */
export type RawRow = Readonly<Record<string, string>>;
/** A field as typed: a text, or rows of texts. */
export type RawValue = string | readonly RawRow[];
export type RawValues = Readonly<Record<string, RawValue>>;

/** One result. `value` may be a word of the catalogue (`{ word }`), a number rounded on the screen, or ready text. */
export interface ResultFigure {
  /** Its words under `<calculator>.figures`. */
  readonly name: string;
  readonly value: number | string | { readonly word: string };
  readonly unit: string;
  readonly digits?: number;
  readonly working?: readonly WorkingStep[];
  /** Stands first and large. */
  readonly isLead?: boolean;
  /** Long: takes a row of its own. */
  readonly isWide?: boolean;
  /** A limit is passed: said in words under `over.<name>` and marked. */
  readonly isOver?: boolean;
}

/** Results that belong together. */
export interface ResultBlock {
  /** Its words under `<calculator>.blocks`; a block without one has no heading. */
  readonly name?: string;
  /** A heading that is ready, where it holds what was chosen. */
  readonly option?: { readonly group: string; readonly value: string };
  /** A heading put together from texts that are ready and words of the catalogue. */
  readonly heading?: readonly (string | { readonly word: string })[];
  /** One of three ways side by side. */
  readonly isWay?: boolean;
  /** The way that was chosen. */
  readonly isChosen?: boolean;
  /** Sentences of the engine. */
  readonly text?: readonly string[];
  readonly figures: readonly ResultFigure[];
}

export interface Result {
  readonly blocks: readonly ResultBlock[];
  /** Sentences of the engine. */
  readonly cautions: readonly string[];
  /** Keys under `cautions`, those that this result asks for. */
  readonly warnings?: readonly string[];
}

export interface Calculator<Fields extends FieldSpecs = FieldSpecs> {
  readonly name: string;
  readonly fields: Fields;
  /** The fields in groups, each with its words under `<calculator>.sections`. */
  readonly sections: readonly {
    readonly name: string;
    readonly fields: readonly (keyof Fields & string)[];
  }[];
  /** Keys under `cautions` that always stand under the results. */
  readonly cautions: readonly string[];
  /** @throws CuttingInputError whose `field` is a field's name, or a row's place and column */
  readonly compute: (values: ValuesOf<Fields>) => Result;
  /** What is drawn beside the results; undefined where there is nothing to draw. */
  readonly draw?: (values: ValuesOf<Fields>) => ReactNode;
}

/** A description with its values typed by its fields, kept as one of many. */
export function defineCalculator<const Fields extends FieldSpecs>(
  calculator: Calculator<Fields>,
): Calculator {
  // The page only ever hands `compute` what `readValues` made from the same fields.
  return calculator as unknown as Calculator;
}

/** A number that must be there. */
export function numberField(unit: string, initial: number, limit?: NumberRange): NumberSpec<false> {
  return { kind: 'number', unit, initial, limit, optional: false };
}

/** A number that may be left empty. */
export function optionalNumber(unit: string, initial: number | null, limit?: NumberRange): NumberSpec<true> {
  return { kind: 'number', unit, initial, limit, optional: true };
}

export function choiceField<const Value extends string>(
  options: readonly Value[],
  initial: NoInfer<Value>,
): ChoiceSpec<Value> {
  return { kind: 'choice', options, initial };
}

export function setField<Value extends string>(
  options: readonly Value[],
  initial: readonly NoInfer<Value>[] = [],
): SetSpec<Value> {
  return { kind: 'set', options, initial };
}

export function switchField(initial: boolean): SwitchSpec {
  return { kind: 'switch', initial };
}

export function numberList(unit: string): NumberListSpec {
  return { kind: 'numbers', unit };
}

/** Rows; `initial` is what the table holds at first, in the order of its columns. */
export function rowsField<Columns extends ColumnSpecs>(
  columns: Columns,
  initial: readonly (readonly (string | number)[])[],
  { minRows = 1 }: { minRows?: number } = {},
): RowsSpec<Columns> {
  const names = Object.keys(columns);
  const rows = initial.map((cells) =>
    Object.fromEntries(names.map((name, index) => [name, String(cells[index] ?? '')])),
  );
  return { kind: 'rows', columns, initial: rows, minRows };
}
