export * from './cents.ts';
export * from './fees.ts';
