import { checkNumber, checkObject } from './check.ts';
import { depthInRange, lengthFtRange } from './limits.ts';

/**
 * Inch-feet: length in feet × depth in inches, the unit sawing is sold by.
 * @throws CuttingInputError
 */
export function inchFeet(input: { readonly lengthFt: number; readonly depthIn: number }): number {
  const fields = checkObject(input, 'input');
  return (
    checkNumber(fields.lengthFt, 'lengthFt', lengthFtRange) *
    checkNumber(fields.depthIn, 'depthIn', depthInRange)
  );
}
