export * from './payment.schema.ts';
export * from './payment.state.ts';
export * from './payment.views.ts';
