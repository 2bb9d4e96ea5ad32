/** A length as drawings write it, to the nearest quarter inch: 12.5 ft is `12'-6"`, 0.75 ft is `9"`. */
export function feetAndInches(lengthFt: number): string {
  const quarters = Math.round(lengthFt * 48);
  const feet = Math.floor(quarters / 48);
  const rest = quarters - feet * 48;
  const whole = Math.floor(rest / 4);
  const part = ['', ' 1/4', ' 1/2', ' 3/4'][rest % 4] ?? '';
  const inches = whole === 0 && part !== '' ? part.trim() : `${whole}${part}`;
  return feet === 0 ? `${inches}"` : `${feet}'-${inches}"`;
}

/** Inches as a mixed number: 7.5 is `7 1/2"`. */
export function inches(lengthIn: number): string {
  return feetAndInches(lengthIn / 12 - Math.floor(lengthIn / 12)) === '0"' || lengthIn >= 12
    ? `${lengthIn}"`
    : feetAndInches(lengthIn / 12);
}
