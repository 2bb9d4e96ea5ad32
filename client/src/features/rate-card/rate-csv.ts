import { MAX_RATES, methods, rateKey, rateRowSchema, rateUnits, type RateRow } from '@kerfyard/common/people';
import { cutKinds } from '@kerfyard/common/scopes';
import { readNumber, readRate, showRate } from '../../components/form/number-fields.tsx';
import { parseCsv, toCsv } from '../../lib/csv.ts';

/** The columns of a rate file, in the order they are written; read in any order. */
export const rateColumns = ['method', 'kind', 'unit', 'up_to_in', 'rate'] as const;
export type RateColumn = (typeof rateColumns)[number];

/** What is wrong with a file: at a row (counted as spreadsheets do, the head being 1) and a column, or as a whole. */
export interface CsvIssue {
  problem: 'too_large' | 'too_many' | 'empty' | 'no_column' | 'unknown_column' | 'cell' | 'twice';
  row?: number;
  column?: string;
  given?: string;
  /** The words that would do, where there are few enough to list, or the limit that was passed. */
  allowed?: string;
}

export type RateFile = { ok: true; rows: RateRow[] } | { ok: false; issues: CsvIssue[] };

/** 500 rates come to some 20 kB; a file much larger is something else. */
export const MAX_FILE_BYTES = 256 * 1024;
const MAX_ISSUES = 50;

export function writeRates(rows: readonly RateRow[]): string {
  const lines = rows.map((row) => [
    row.method,
    row.kind,
    row.unit,
    row.upToIn,
    showRate(row.rate).replaceAll(',', ''),
  ]);
  return toCsv([[...rateColumns], ...lines]);
}

/** Read rates from a CSV text. All faults come at once, up to fifty; nothing is taken from a file that has any. */
export function readRates(text: string): RateFile {
  if (text.length > MAX_FILE_BYTES) return whole('too_large', { allowed: '256 kB' });
  const cells = parseCsv(text, MAX_RATES + 1);
  if (cells === null) return whole('too_many', { allowed: String(MAX_RATES) });
  const [head, ...body] = cells;
  if (head === undefined || body.length === 0) return whole('empty');
  const names = head.map((name) => name.toLowerCase().replaceAll(/[\s-]+/g, '_'));
  const wrongHead = headIssues(names, head);
  if (wrongHead.length > 0) return { ok: false, issues: wrongHead };
  const issues: CsvIssue[] = [];
  const rows = body.flatMap((line, index) => readRow(names, line, index + 2, issues));
  issues.push(...twiceIssues(rows, body.length));
  return issues.length > 0 ? { ok: false, issues: issues.slice(0, MAX_ISSUES) } : { ok: true, rows };
}

function whole(problem: CsvIssue['problem'], more: Partial<CsvIssue> = {}): RateFile {
  return { ok: false, issues: [{ problem, ...more }] };
}

function headIssues(names: readonly string[], head: readonly string[]): CsvIssue[] {
  const missing = rateColumns.filter((column) => !names.includes(column));
  const unknown = names.flatMap((name, at) =>
    isColumn(name) && names.indexOf(name) === at ? [] : [head[at] ?? ''],
  );
  return [
    ...missing.map((column): CsvIssue => ({ problem: 'no_column', row: 1, column })),
    ...unknown.map((column): CsvIssue => ({
      problem: 'unknown_column',
      row: 1,
      column: column.slice(0, 40),
    })),
  ];
}

function isColumn(name: string): name is RateColumn {
  return (rateColumns as readonly string[]).includes(name);
}

const wordsOf: Partial<Record<RateColumn, readonly string[]>> = {
  method: methods,
  kind: cutKinds,
  unit: rateUnits,
};
const fieldOf: Record<RateColumn, keyof RateRow> = {
  method: 'method',
  kind: 'kind',
  unit: 'unit',
  up_to_in: 'upToIn',
  rate: 'rate',
};

function readRow(
  names: readonly string[],
  line: readonly string[],
  row: number,
  issues: CsvIssue[],
): RateRow[] {
  const cell = (column: RateColumn) => line[names.indexOf(column)] ?? '';
  const code = (column: RateColumn) =>
    cell(column)
      .toLowerCase()
      .replaceAll(/[\s-]+/g, '_');
  const parsed = rateRowSchema.safeParse({
    method: code('method'),
    kind: code('kind') === '' ? null : code('kind'),
    unit: code('unit'),
    upToIn: readNumber(cell('up_to_in')),
    rate: readRate(cell('rate')),
  });
  if (parsed.success) return [parsed.data];
  for (const column of rateColumns) {
    const issue = parsed.error.issues.find(({ path }) => path[0] === fieldOf[column]);
    if (issue === undefined) continue;
    const allowed = wordsOf[column]?.join(', ') ?? issue.message;
    issues.push({ problem: 'cell', row, column, given: cell(column).slice(0, 40), allowed });
  }
  return [];
}

/** Bands given twice, once every row could be read (otherwise their places would not be right). */
function twiceIssues(rows: readonly RateRow[], lines: number): CsvIssue[] {
  if (rows.length !== lines) return [];
  const seen = new Set<string>();
  return rows.flatMap((row, index) => {
    const key = rateKey(row);
    const isTwice = seen.has(key);
    seen.add(key);
    return isTwice ? [{ problem: 'twice' as const, row: index + 2, column: 'up_to_in' }] : [];
  });
}
