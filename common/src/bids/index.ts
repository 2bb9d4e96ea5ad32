export * from './bid-units.ts';
export * from './bid.schema.ts';
export * from './bid.rules.ts';
export * from './bid.views.ts';
export * from './price-bid.ts';
export * from './price-from-card.ts';
