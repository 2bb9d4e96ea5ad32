import { checkNumber, CuttingInputError } from '@kerfyard/common/cutting';
import type {
  ColumnSpec,
  ColumnSpecs,
  FieldSpec,
  FieldSpecs,
  NumberSpec,
  RawRow,
  RawValue,
  RawValues,
} from './calculator.ts';

/** The most rows of a table: more would not be a sum one does by hand. */
export const maxRows = 40;
const maxTextLength = 200;
const cellMark = '~';

/** What the fields hold before anything is typed. */
export function initialValues(fields: FieldSpecs): RawValues {
  return mapFields(fields, initialOf);
}

/** The fields as an address carries them; a field it does not name holds its initial value. */
export function readAddress(fields: FieldSpecs, search: URLSearchParams): RawValues {
  return mapFields(fields, (spec, name) => {
    const texts = search.getAll(name).map((text) => text.slice(0, maxTextLength));
    if (texts[0] === undefined) return initialOf(spec);
    return spec.kind === 'rows' ? readRows(spec.columns, texts) : texts[0];
  });
}

/**
 * The address of what is typed: every field, so that a result sent to someone keeps its numbers though the initial
 * ones may change some day. Other parameters stay.
 */
export function writeAddress(
  fields: FieldSpecs,
  raw: RawValues,
  others: URLSearchParams = new URLSearchParams(),
): URLSearchParams {
  const search = new URLSearchParams(others);
  for (const [name, spec] of Object.entries(fields)) {
    search.delete(name);
    const value = raw[name] ?? '';
    if (typeof value === 'string') search.append(name, value);
    // A table without rows is still a table: without a mark of its own it would come back full.
    else if (value.length === 0) search.append(name, '');
    else for (const row of value) search.append(name, writeRow(spec, row));
  }
  return search;
}

/** Whether an address names any of the fields. */
export function isInAddress(fields: FieldSpecs, search: URLSearchParams): boolean {
  return Object.keys(fields).some((name) => search.has(name));
}

/** Field, or place of a cell as in `tasks[1].hours` → what is wrong there, in the engine's words. */
export type Problems = Readonly<Record<string, string>>;

/** What is typed as the numbers and choices it means, and everything that is not one, all at once. */
export function readValues(
  fields: FieldSpecs,
  raw: RawValues,
): { values: Readonly<Record<string, unknown>>; problems: Problems } {
  const problems: Record<string, string> = {};
  const attempt = (field: string, read: () => unknown): unknown => {
    try {
      return read();
    } catch (error) {
      if (!(error instanceof CuttingInputError)) throw error;
      problems[field] = error.allowed;
      return undefined;
    }
  };
  const values: Record<string, unknown> = {};
  for (const [name, spec] of Object.entries(fields)) {
    const value = raw[name] ?? '';
    if (spec.kind !== 'rows') {
      values[name] = attempt(name, () => readOne(spec, value, name));
      continue;
    }
    const rows = typeof value === 'string' ? [] : value;
    values[name] = rows.map((row, index) =>
      mapFields(spec.columns, (column, cell) => {
        const place = `${name}[${index}].${cell}`;
        return attempt(place, () => readCell(column, row[cell] ?? '', place));
      }),
    );
  }
  return { values, problems: Object.keys(problems).length === 0 ? noProblems : problems };
}

// One and the same object: fields that did not change need not be drawn anew.
const noProblems: Problems = {};

/** `1,234.5` → 1234.5; anything that is no number stays the text it is, for the engine to refuse. */
export function typedNumber(text: string): number | string {
  const plain = text.replaceAll(',', '').trim();
  return /^[-+]?(\d+\.?\d*|\.\d+)(e[-+]?\d+)?$/i.test(plain) ? Number(plain) : text.trim();
}

/** A new row of a table: the choices of the last one, its numbers empty. */
export function nextRow(columns: ColumnSpecs, rows: readonly RawRow[]): RawRow {
  const last = rows.at(-1);
  return mapFields(columns, (column, name) =>
    column.kind === 'choice' ? (last?.[name] ?? column.initial) : initialOf(column),
  ) as RawRow;
}

function mapFields<Spec, Value>(
  fields: Readonly<Record<string, Spec>>,
  make: (spec: Spec, name: string) => Value,
): Record<string, Value> {
  return Object.fromEntries(Object.entries(fields).map(([name, spec]) => [name, make(spec, name)]));
}

function initialOf(spec: FieldSpec): RawValue {
  switch (spec.kind) {
    case 'number':
      return spec.initial === null ? '' : String(spec.initial);
    case 'choice':
      return spec.initial;
    case 'set':
      return spec.initial.join(',');
    case 'switch':
      return spec.initial ? 'yes' : 'no';
    case 'numbers':
      return '';
    case 'rows':
      return spec.initial;
  }
}

function readRows(columns: ColumnSpecs, texts: readonly string[]): readonly RawRow[] {
  const names = Object.keys(columns);
  return texts
    .filter((text) => text !== '')
    .slice(0, maxRows)
    .map((text) => {
      const cells = text.split(cellMark);
      return Object.fromEntries(names.map((name, index) => [name, cells[index] ?? '']));
    });
}

function writeRow(spec: FieldSpec, row: RawRow): string {
  if (spec.kind !== 'rows') return '';
  return Object.keys(spec.columns)
    .map((name) => (row[name] ?? '').replaceAll(cellMark, ' '))
    .join(cellMark);
}

function readOne(spec: Exclude<FieldSpec, { kind: 'rows' }>, raw: RawValue, name: string): unknown {
  const text = typeof raw === 'string' ? raw.trim() : '';
  switch (spec.kind) {
    case 'set': {
      const chosen = text === '' ? [] : text.split(',');
      for (const value of chosen) oneOf(spec.options, value, name);
      return spec.options.filter((option) => chosen.includes(option));
    }
    case 'switch':
      return oneOf(['yes', 'no'], text, name) === 'yes';
    case 'numbers':
      return text === ''
        ? undefined
        : text
            .split(/[\s,;]+/)
            .filter(Boolean)
            .map(typedNumber);
    default:
      return readCell(spec, text, name);
  }
}

function readCell(spec: ColumnSpec, text: string, name: string): unknown {
  return spec.kind === 'choice' ? oneOf(spec.options, text, name) : readNumber(spec, text, name);
}

function readNumber(spec: NumberSpec, text: string, field: string): unknown {
  if (text.trim() === '' && spec.optional) return undefined;
  const value = text.trim() === '' ? undefined : typedNumber(text);
  return spec.limit === undefined ? value : checkNumber(value, field, spec.limit);
}

function oneOf(options: readonly string[], given: string, field: string): string {
  if (options.includes(given)) return given;
  throw new CuttingInputError({ field, allowed: 'one of those offered', given });
}
