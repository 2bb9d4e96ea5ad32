import { fileLimits } from '@kerfyard/common/files';

/** What one request may carry and how fast; sizes of single files are `common`'s. */
export const uploadLimits = {
  /** Ten full files with their headers. */
  maxBodyBytes: fileLimits.maxFilesPerRequest * fileLimits.maxBytes + 1024 * 1024,
  /** Beyond ten, files are named as refused; beyond this the request is. */
  maxParts: 40,
  maxFields: 4,
  maxFieldBytes: 200,
  /** A sender that is silent for this long is cut off. */
  stallMs: 30_000,
  /** Room for all files of one company. */
  companyBytes: 20 * 1024 * 1024 * 1024,
} as const;
