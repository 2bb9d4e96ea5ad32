import { v7 } from 'uuid';

/** A UUIDv7: made on this side, so that what is created offline or sent twice keeps one identity. */
export function newId(): string {
  return v7();
}
