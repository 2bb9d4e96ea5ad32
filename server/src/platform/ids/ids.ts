import { v7 } from 'uuid';

/** A time-ordered id (RFC 9562, version 7). */
export const newId = (): string => v7();
