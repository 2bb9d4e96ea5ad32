const sorted = (values) => [...values].sort((a, b) => a - b);

/** The value that this part (0 to 1) of all values does not exceed. */
export function quantile(values, part) {
  const ordered = sorted(values);
  return ordered[Math.min(ordered.length - 1, Math.max(0, Math.ceil(part * ordered.length) - 1))];
}

export const median = (values) => quantile(values, 0.5);

const rounded = (value) => Number(value.toPrecision(4));

/** Minimum, median and maximum as columns of a bench's table. */
export const spread = (values) => ({
  min: rounded(Math.min(...values)),
  median: rounded(median(values)),
  max: rounded(Math.max(...values)),
});

/** The ratio of each round's two figures: measured next to each other, so that a busy moment burdens both. */
export const ratios = (ours, bare) => ours.map((value, index) => value / bare[index]);
