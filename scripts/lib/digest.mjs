const shortEnough = 40;
const aroundError = 20;
const atEnd = 10;

/**
 * The lines of a long output worth reading: all of a short one; else from the first line that names an error, since what
 * hangs on an error can be hundreds of lines, and the end, which says how it ended.
 */
export function digest(lines) {
  if (lines.length <= shortEnough) return lines.join('\n').trim();
  const end = lines.slice(-atEnd);
  const body = lines.slice(0, -atEnd);
  const firstError = body.findIndex((line) => /\b(\w*Error|error)\b[: ]/.test(line));
  const start = firstError === -1 ? body.length - aroundError : firstError;
  return [...body.slice(start, start + aroundError), '…', ...end].join('\n').trim();
}
