/**
 * Passwords that are tried first. Twelve characters are the minimum, so whole lists of short ones never get here:
 * what remains are known words repeated, joined, counted up or walked along the keyboard. The words are those that
 * head every published list of leaked passwords (from memory; no list is copied).
 */
// prettier-ignore
const KNOWN_WORDS = [
  'password', 'passwort', 'passw0rd', 'p@ssw0rd', 'contrasena', 'letmein', 'welcome', 'iloveyou', 'loveyou',
  'trustno', 'changeme', 'default', 'secret', 'access', 'administrator', 'admin', 'root', 'login', 'master', 'guest',
  'test', 'user', 'hello', 'sunshine', 'princess', 'dragon', 'monkey', 'shadow', 'superman', 'batman', 'football',
  'baseball', 'basketball', 'soccer', 'hockey', 'michael', 'jordan', 'jennifer', 'ashley', 'charlie', 'daniel',
  'jessica', 'andrew', 'thomas', 'robert', 'matthew', 'hunter', 'ranger', 'buster', 'tigger', 'pepper', 'ginger',
  'cookie', 'cheese', 'banana', 'flower', 'freedom', 'whatever', 'starwars', 'computer', 'internet', 'samsung',
  'google', 'summer', 'winter', 'spring', 'autumn', 'january', 'monday', 'friday', 'killer', 'george', 'zaq',
  'qazwsx', 'concrete', 'cutting', 'coring', 'drilling', 'contractor', 'construction', 'company', 'kerfyard',
] as const;

// prettier-ignore
const KEY_ROWS = [
  '01234567890', '09876543210', 'abcdefghijklmnopqrstuvwxyz', 'zyxwvutsrqponmlkjihgfedcba',
  'qwertyuiop', 'poiuytrewq', 'asdfghjkl', 'lkjhgfdsa', 'zxcvbnm', 'mnbvcxz', 'qwertz', 'azerty',
  '1qaz2wsx3edc4rfv5tgb6yhn7ujm', '!@#$%^&*()',
] as const;

/** Characters a password must keep after everything guessable is taken out of it. */
const MIN_UNEXPLAINED = 5;
const MIN_RUN = 3;

/**
 * Whether a password is made of well-known words, runs of keys or the person's own words (name, e-mail, company).
 * @param ownWords anything about the person that an acquaintance knows
 */
export function isGuessable(password: string, ownWords: readonly string[]): boolean {
  const plain = password.normalize('NFKC').toLowerCase();
  if (new Set(plain).size < MIN_UNEXPLAINED) return true;
  const own = ownWords
    .flatMap((words) => words.toLowerCase().split(/[^\p{L}\p{N}]+/u))
    .filter((w) => w.length >= 3);
  const words = [...KNOWN_WORDS, ...own].sort((a, b) => b.length - a.length);
  const rest = [plain, unleet(plain)].map((text) => unexplained(text, words));
  return Math.min(...rest) < MIN_UNEXPLAINED;
}

/** How many characters are left when known words, runs of keys, years, signs and repeats are gone. */
function unexplained(text: string, words: readonly string[]): number {
  let left = text;
  for (const word of words) left = left.split(word).join(' ');
  left = left.replace(/(.+?)\1{2,}/gu, ' ');
  for (const row of KEY_ROWS) left = withoutRuns(left, row);
  left = left.replace(/(?:19|20)\d\d/gu, ' ');
  const letters = left.replace(/[^\p{L}]/gu, '');
  const digits = left.replace(/[^\p{N}]/gu, '');
  // A digit says about half of what a letter does.
  return new Set(letters + digits).size < 3 ? 0 : letters.length + Math.floor(digits.length / 2);
}

function withoutRuns(text: string, row: string): string {
  let left = text;
  for (let length = row.length; length >= MIN_RUN; length -= 1) {
    for (let start = 0; start + length <= row.length; start += 1) {
      left = left.split(row.slice(start, start + length)).join(' ');
    }
  }
  return left;
}

/** Signs that stand for letters in the oldest trick there is. */
function unleet(text: string): string {
  const letters: Record<string, string> = {
    '0': 'o',
    '1': 'l',
    '3': 'e',
    '4': 'a',
    '5': 's',
    '7': 't',
    '@': 'a',
    $: 's',
    '!': 'i',
  };
  return [...text].map((sign) => letters[sign] ?? sign).join('');
}
