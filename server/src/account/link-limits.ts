import type { Origin } from '../platform/auth/access.decorators.ts';
import type { LimitedSubject, Window } from '../platform/limits/rate-limits.ts';

/** How long a link by mail works; OWASP's Forgot Password cheat sheet asks for a short life. */
export const LINK_SECONDS = 3_600;

/** Mails to one address, whoever asks. */
export const perEmail: readonly Window[] = [
  { hits: 3, seconds: 600 },
  { hits: 8, seconds: 86_400 },
];

const perAddress: readonly Window[] = [
  { hits: 10, seconds: 600 },
  { hits: 60, seconds: 86_400 },
];

/** Asking for links, or using them, from one address of the network. */
export const linkLimits = (what: string, { ip }: Origin): LimitedSubject[] => [
  { parts: [what, 'address', ip], windows: perAddress },
];

/** Passwords and codes asked of someone signed in. */
export const proofLimits = (userId: string): LimitedSubject[] => [
  {
    parts: ['proof', userId],
    windows: [
      { hits: 8, seconds: 60 },
      { hits: 25, seconds: 900 },
      { hits: 100, seconds: 86_400 },
    ],
  },
];
