export * from './visit.schema.ts';
export * from './visit.state.ts';
export * from './visit.views.ts';
