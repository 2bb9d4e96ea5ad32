export const IDEMPOTENT = 'kerfyard:idempotent';

export interface IdempotentOptions {
  keepsReply: boolean;
}
