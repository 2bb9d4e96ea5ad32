export * from './check-draft.ts';
export * from './cut.schema.ts';
export * from './responsibilities.ts';
export * from './scope.schema.ts';
export * from './scope.state.ts';
export * from './scope.views.ts';
export * from './totals.ts';
export * from './methods-of-cuts.ts';
