/**
 * Passwords that are on everybody's list of first guesses. The list is our own: words that people take when they are
 * told to take a password, walks over the keyboard, runs and repeats, the product's words and the person's own.
 * A password is refused when, these pieces taken away, fewer than six characters are left.
 */
const favourites = `
  password passwort passwd motdepasse contrasena senha wachtwoord parola salasana kennwort passphrase
  welcome willkommen letmein login logon signin admin administrator root user guest default changeme change
  secret geheim master access sesame superman batman spiderman starwars pokemon matrix trustno
  iloveyou loveyou lovely love forever princess prinzessin angel babygirl sweetheart honey baby
  sunshine flower butterfly rainbow summer winter spring autumn sommer herbst
  monday tuesday wednesday thursday friday saturday sunday january february march april june july august
  september october november december
  monkey dragon tiger shadow killer ninja pirate hunter ranger cowboy
  football baseball basketball soccer hockey liverpool chelsea arsenal barcelona juventus
  michael jordan michelle jessica jennifer charlie thomas daniel andrew joshua ashley nicole
  computer internet samsung iphone google facebook microsoft windows apple
  hello hallo test testing tester demo temp temporary mypassword mypass pass word whatever nothing
  freedom america cheese cookie chocolate coffee
  correcthorsebatterystaple thequickbrownfoxjumpsoverthelazydog tobeornottobethatisthequestion
  maytheforcebewithyou openthedoor onceuponatime
`;
const ours = `
  quartzhold quartz crystal crystals oscillator oscillators resonator frequency hertz megahertz carrier offset
  receiver radio lot lots hold holds bench technician quality engineer supplier auditor accept reject
`;
const walks = [
  'qwertyuiopasdfghjklzxcvbnm',
  'qwertzuiopasdfghjklyxcvbnm',
  'azertyuiopqsdfghjklmwxcvbn',
  'asdfghjklzxcvbnm',
  'zxcvbnm',
  'abcdefghijklmnopqrstuvwxyz',
  '01234567890123456789',
  '1qaz2wsx3edc4rfv5tgb6yhn7ujm8ik9ol0p',
  'qazwsxedcrfvtgbyhnujmikolp',
  '1q2w3e4r5t6z7u8i9o0p',
  '1q2w3e4r5t6y7u8i9o0p',
  'q1w2e3r4t5y6u7i8o9p0',
  'zaq12wsxcde34rfvbgt56yhnmju78',
];

const words = (text: string) => text.split(/\s+/).filter(Boolean);
const allWalks = walks.flatMap((walk) => [walk, [...walk].reverse().join('')]);
/** Written for letters so often that it hides nothing. */
const leet: Record<string, string> = {
  0: 'o',
  1: 'i',
  3: 'e',
  4: 'a',
  5: 's',
  7: 't',
  8: 'b',
  '@': 'a',
  $: 's',
};

const leastLeft = 6;
/** From this length on even one repeated character is out of reach of guessing by lists. */
const longEnough = 40;

function isRepeat(text: string): boolean {
  for (let length = 1; length <= 8; length += 1) {
    if (text.slice(length) === text.slice(0, -length)) return true;
  }
  return false;
}

/** A password as written and as meant, character by character. */
interface Reading {
  written: string[];
  meant: string[];
}

function readingOf(lower: string): Reading {
  const written = [...lower].filter((c) => /[\p{L}\p{N}]/u.test(leet[c] ?? c));
  return { written, meant: written.map((c) => leet[c] ?? c) };
}

function beginsWith({ written, meant }: Reading, start: number, piece: string): boolean {
  return [...piece].every((c, i) => written[start + i] === c || meant[start + i] === c);
}

/** Length of the longest walk (3 or more keys) that begins at `start`. */
function walkFrom({ written }: Reading, start: number): number {
  for (let end = Math.min(written.length, start + 40); end >= start + 3; end -= 1) {
    const keys = written.slice(start, end).join('');
    if (allWalks.some((walk) => walk.includes(keys))) return end - start;
  }
  return 0;
}

function runFrom({ written }: Reading, start: number): number {
  let end = start;
  while (end < written.length && written[end] === written[start]) end += 1;
  return end - start >= 3 ? end - start : 0;
}

/** Years and other numbers are the first thing put behind a word. */
function digitsFrom({ written }: Reading, start: number): number {
  let end = start;
  while (end < start + 4 && /\d/.test(written[end] ?? '')) end += 1;
  return end - start;
}

/** Characters left when as many as possible are covered by known pieces. */
function charactersLeft(reading: Reading, pieces: string[], countRuns: boolean): number {
  const { length } = reading.written;
  const least = new Array<number>(length + 1).fill(0);
  for (let start = length - 1; start >= 0; start -= 1) {
    const covered = pieces
      .filter((piece) => beginsWith(reading, start, piece))
      .map((piece) => piece.length);
    covered.push(walkFrom(reading, start), digitsFrom(reading, start));
    if (countRuns) covered.push(runFrom(reading, start));
    least[start] = Math.min(
      1 + least[start + 1]!,
      ...covered.filter((count) => count > 0).map((count) => least[start + count]!),
    );
  }
  return least[0]!;
}

/** Why a password may not be used, or null. `own`: name and address of the person it is for. */
export function passwordRefusal(password: string, own: string[] = []): string | null {
  const lower = password.normalize('NFKC').toLowerCase();
  const long = password.length >= longEnough;
  if (!long && isRepeat(lower))
    return 'This repeats a few characters and is among the first things tried. Take a sentence of your own.';
  const personal = own
    .flatMap((text) => text.toLowerCase().split(/[^\p{L}\p{N}]+/u))
    .filter((word) => word.length >= 3);
  const pieces = [...words(favourites), ...words(ours), ...personal];
  if (charactersLeft(readingOf(lower), pieces, !long) < leastLeft)
    return 'This is made of words and rows of keys that are tried first, or of your own name or ours. Take a sentence of your own.';
  return null;
}
