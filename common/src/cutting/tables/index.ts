export type { Provenance, SourcedTable } from './provenance.ts';
export * from './blade-reach.ts';
export * from './joints.ts';
export * from './lip.ts';
export * from './unit-weights.ts';
