/** Browser storage that may be closed to us (private windows, policies): reading gives null, writing does nothing. */
type Area = 'localStorage' | 'sessionStorage';

export function readStored(area: Area, key: string): string | null {
  try {
    return window[area].getItem(key);
  } catch {
    return null;
  }
}

export function writeStored(area: Area, key: string, value: string | null): void {
  try {
    if (value === null) window[area].removeItem(key);
    else window[area].setItem(key, value);
  } catch {
    // Full or closed: what is stored here is a convenience, never the only copy.
  }
}
