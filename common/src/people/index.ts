export * from './roles.ts';
export * from './permissions.ts';
export * from './people.schema.ts';
export * from './people.views.ts';
export * from './account.schema.ts';
export * from './account.views.ts';
export * from './members.schema.ts';
export * from './rate-card.schema.ts';
