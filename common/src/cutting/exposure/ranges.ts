/** Hours of one entry; nobody works one task longer than a day. Zero is a task not yet given time. */
export const hoursRange = { min: 0, max: 24, unit: 'h' } as const;

export const levelDbaRange = { min: 0, max: 200, unit: 'dBA' } as const;

/** The most entries of one shift. */
export const maxExposures = 1_000;
