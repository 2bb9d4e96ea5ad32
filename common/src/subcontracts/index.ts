export * from './subcontract.schema.ts';
export * from './subcontract.state.ts';
export * from './subcontract.views.ts';
