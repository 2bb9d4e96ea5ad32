export * from './completion.schema.ts';
export * from './completion.state.ts';
export * from './completion.views.ts';
