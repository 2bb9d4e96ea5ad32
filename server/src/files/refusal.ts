import type { UploadResult } from '@kerfyard/common/files';

export type RefusalCode = UploadResult['refused'][number]['code'];

/** Why one file of an upload is not taken; the others go on. */
export class Refusal extends Error {
  constructor(
    readonly code: RefusalCode,
    message: string,
  ) {
    super(message);
    this.name = 'Refusal';
  }
}
