import { fileLimits } from '@kerfyard/common/files';

const CONTROL_AND_BIDI = /[\u0000-\u001f\u007f-\u009f\u061c\u200b-\u200f\u2028-\u202e\u2060-\u2069\ufeff]/g;
/** Names of devices on Windows, where a downloaded `CON.jpg` cannot be saved (Microsoft, "Naming Files"). */
const DEVICE = /^(con|prn|aux|nul|com[0-9]|lpt[0-9])(\.|$)/i;

/**
 * A name as data: what people read beside a file and what a download is saved as, never a path of ours. Folders,
 * control characters, direction overrides and characters that file systems refuse go; at most 200 characters stay,
 * the extension among them. Never empty.
 */
export function cleanFileName(raw: string): string {
  const last = raw.replace(CONTROL_AND_BIDI, '').split(/[\\/]/).at(-1) ?? '';
  const plain = last
    .normalize('NFC')
    .replace(/[<>:"|?*]/g, ' ')
    .replace(/\s+/g, ' ')
    .replace(/ \./g, '.')
    .replace(/^[. ]+|[. ]+$/g, '');
  const safe = plain === '' || DEVICE.test(plain) ? `file ${plain}`.trim() : plain;
  return shorten(safe, fileLimits.maxNameLength);
}

/** The part after the last dot, in lower case; '' when there is none. */
export function extensionOf(name: string): string {
  const dot = name.lastIndexOf('.');
  return dot > 0 ? name.slice(dot + 1).toLowerCase() : '';
}

function shorten(name: string, max: number): string {
  const letters = Array.from(name);
  if (name.length <= max) return name;
  const extension = extensionOf(name);
  const tail = extension !== '' && extension.length <= 10 ? `.${extension}` : '';
  let kept = '';
  // By whole characters: half of a surrogate pair is not text.
  for (const letter of letters) {
    if (kept.length + letter.length > max - tail.length) break;
    kept += letter;
  }
  return kept.trimEnd() + tail;
}
