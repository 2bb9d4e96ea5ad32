/**
 * Thrown by every function of the engine for input it will not calculate with: not finite, negative, zero
 * where that is senseless, out of range, too many, of the wrong type, or an unknown choice. Nothing is
 * clamped or guessed.
 */
export class CuttingInputError extends Error {
  override readonly name = 'CuttingInputError';
  /** Path of the field inside the input object, for example `depthIn` or `cuts[3].removal.maxPieceLb`. */
  readonly field: string;
  /** What is allowed there, in words with its unit. */
  readonly allowed: string;
  /** What was given. */
  readonly given: unknown;

  constructor({ field, allowed, given }: { field: string; allowed: string; given: unknown }) {
    super(`${field} must be ${allowed}; given ${describeGiven(given)}`);
    this.field = field;
    this.allowed = allowed;
    this.given = given;
  }

  /** The same error seen from an enclosing object: `within('cuts[3]')` makes `depthIn` `cuts[3].depthIn`. */
  within(path: string): CuttingInputError {
    return new CuttingInputError({
      field: `${path}.${this.field}`,
      allowed: this.allowed,
      given: this.given,
    });
  }
}

function describeGiven(given: unknown): string {
  if (given === undefined) return 'nothing';
  if (given === null) return 'null';
  if (typeof given === 'number' || typeof given === 'boolean' || typeof given === 'bigint')
    return String(given);
  if (typeof given === 'string') return `"${given.length > 40 ? `${given.slice(0, 40)}…` : given}"`;
  if (Array.isArray(given)) return `a list of ${given.length}`;
  return `a value of type ${typeof given}`;
}
