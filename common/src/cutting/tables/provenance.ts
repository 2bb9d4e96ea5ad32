import type { Certainty, WorkingSource } from '../working.ts';

/** Where a table comes from and how sure it is. */
export interface Provenance {
  readonly document: string;
  readonly section?: string;
  readonly edition?: string;
  readonly certainty: Certainty;
}

/** A table is its rows and where they come from. */
export interface SourcedTable<Rows> {
  readonly source: Provenance;
  readonly rows: Rows;
}

/** The source line a working step prints for a number out of a table. */
export function sourceOf(source: Provenance): WorkingSource {
  const { certainty, document, section, edition } = source;
  return {
    origin: certainty,
    document,
    ...(section === undefined ? {} : { section }),
    ...(edition === undefined ? {} : { edition }),
  };
}
