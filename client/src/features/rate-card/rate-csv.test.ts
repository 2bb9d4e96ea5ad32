import type { RateRow } from '@kerfyard/common/people';
import { describe, expect, it } from 'vitest';
import { readRate, showRate } from '../../components/form/number-fields.tsx';
import { parseCsv, toCsv } from '../../lib/csv.ts';
import { readRates, writeRates } from './rate-csv.ts';

const rows: RateRow[] = [
  { method: 'flat_saw', kind: null, unit: 'in_ft', upToIn: 6, rate: 8_500 },
  { method: 'hand_saw', kind: 'bar', unit: 'each', upToIn: null, rate: 12_345_678 },
];
const head = 'method,kind,unit,up_to_in,rate';

describe('rates as a file', () => {
  it('come back as they went out', () => {
    expect(readRates(writeRates(rows))).toEqual({ ok: true, rows });
    expect(writeRates(rows).split('\r\n')[1]).toBe('flat_saw,,in_ft,6,0.85');
  });

  it('are read as spreadsheets write them: byte-order mark, quotes, any order, spaces and dollars', () => {
    const text = '\ufeffRate,Unit,Up to in,Method,Kind\r\n"$1,234.50",in ft,"6",Flat saw,\r\n\r\n';
    expect(readRates(text)).toEqual({
      ok: true,
      rows: [{ method: 'flat_saw', kind: null, unit: 'in_ft', upToIn: 6, rate: 12_345_000 }],
    });
  });

  it('name every fault by row and column, and take nothing from such a file', () => {
    const read = readRates(`${head}\nflat_saw,,in_ft,6,0.85\naxe,,in_ft,six,1\nflat_saw,moat,lump,,-1\n`);
    if (read.ok) throw new Error('taken');
    expect(read.issues.map(({ row, column, given }) => [row, column, given])).toEqual([
      [3, 'method', 'axe'],
      [3, 'up_to_in', 'six'],
      [4, 'kind', 'moat'],
      [4, 'unit', 'lump'],
      [4, 'rate', '-1'],
    ]);
    expect(read.issues[0]?.allowed).toContain('wall_saw');
  });

  it('name missing and unknown columns, a band given twice, and a file with nothing in it', () => {
    const problems = (text: string) => {
      const read = readRates(text);
      return read.ok ? [] : read.issues.map(({ problem, row, column }) => [problem, row, column]);
    };
    expect(problems('method,kind,unit,rate,discount\nflat_saw,,lf,1,1')).toEqual([
      ['no_column', 1, 'up_to_in'],
      ['unknown_column', 1, 'discount'],
    ]);
    expect(problems(`${head}\nflat_saw,,lf,6,1\nflat_saw,,lf,6,2`)).toEqual([['twice', 3, 'up_to_in']]);
    expect(problems('')).toEqual([['empty', undefined, undefined]]);
    expect(problems(head)).toEqual([['empty', undefined, undefined]]);
  });

  it('are refused at once when there are a hundred thousand', () => {
    const short = `${head}\n${'a,,,,1\n'.repeat(100_000)}`;
    const started = performance.now();
    expect(readRates(short)).toMatchObject({ ok: false, issues: [{ problem: 'too_large' }] });
    expect(readRates(`${head}\n${'a\n'.repeat(100_000)}`)).toMatchObject({
      ok: false,
      issues: [{ problem: 'too_many', allowed: '500' }],
    });
    expect(performance.now() - started).toBeLessThan(100);
  });

  it('give a spreadsheet no formula', () => {
    expect(toCsv([['=1+1', '+2', '-x', '@a', '\tb', '-2']])).toBe("'=1+1,'+2,'-x,'@a,'\tb,-2\r\n");
    const read = readRates(`${head}\n=HYPERLINK(1),,in_ft,6,1`);
    expect(read).toMatchObject({ ok: false, issues: [{ row: 2, column: 'method', given: '=HYPERLINK(1)' }] });
  });
});

describe('a CSV text', () => {
  it('keeps quoted commas, line ends and quotes', () => {
    expect(parseCsv('a,"b, ""c""\nd"\r\n1,2', 10)).toEqual([
      ['a', 'b, "c"\nd'],
      ['1', '2'],
    ]);
    expect(parseCsv('a,\nb', 10)).toEqual([['a', ''], ['b']]);
    expect(parseCsv('a\nb\nc', 2)).toBeNull();
  });

  it('ends, whatever is in it', () => {
    for (const text of ['"', 'a"b,"c', '"a"b', ',"', '\r\r\n'])
      expect(Array.isArray(parseCsv(text, 9))).toBe(true);
  });
});

describe('a rate typed in dollars', () => {
  it('keeps hundredths of a cent, and shows them as typed', () => {
    const typed = ['0.85', '$1,234.5', '0.0425', '.9', '12', '0.125'];
    expect(typed.map(readRate)).toEqual([8_500, 12_345_000, 425, 9_000, 120_000, 1_250]);
    expect([8_500, 12_345_000, 425, 120_000, 1_250].map(showRate)).toEqual([
      '0.85',
      '1,234.50',
      '0.0425',
      '12',
      '0.125',
    ]);
    expect(readRate('')).toBeNull();
    expect([readRate('x'), readRate('0.00001'), readRate('-1')]).toEqual(['x', '0.00001', '-1']);
  });
});
