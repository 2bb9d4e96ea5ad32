const DAY = 86_400;

/** A session ends after this long without a refresh (pages refresh every few minutes while open). */
export const IDLE_SECONDS = 7 * DAY;
/** And after this long whatever happens. */
export const ABSOLUTE_SECONDS = 30 * DAY;
/** Two tabs, or a lost reply: the token just replaced still leads to its one successor. */
export const GRACE_SECONDS = 30;
/** How long a password or a code just given counts for sensitive acts. */
export const RECENT_SECONDS = 600;
