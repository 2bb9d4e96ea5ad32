export * from './roles.ts';
export * from './permissions.ts';
export * from './people.schema.ts';
export * from './people.views.ts';
