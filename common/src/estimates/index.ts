export * from './estimate.types.ts';
export { estimateJob } from './estimate-job.ts';
