import type { SourcedTable } from './provenance.ts';

/** Daily hand-arm values, m/s² A(8). European values; no US limit. */
export const vibrationValues: SourcedTable<{ readonly actionMps2: number; readonly limitMps2: number }> = {
  source: { document: 'Directive 2002/44/EC', section: 'Article 3', edition: '2002', certainty: 'published' },
  rows: { actionMps2: 2.5, limitMps2: 5 },
};

export const vibrationNote = 'European values; no US limit';
