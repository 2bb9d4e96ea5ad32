import { toNumber } from '../platform/database/codecs.ts';

/** The platform-wide human number as people say it: "K-1042". */
export const scopeNumber = (value: string): string => `K-${toNumber(value)}`;
