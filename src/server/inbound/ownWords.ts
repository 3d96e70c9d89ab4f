const SIGNATURE = /^-- ?$/;
const QUOTED = /^\s*>/;
/** "Original Message", "Ursprüngliche Nachricht", a rule of underscores: what follows is the mail answered to. */
const DIVIDER = /^\s*(-{2,}\s*\p{L}[^-]{3,60}-{2,}|_{10,})\s*$/u;
/** The head of a mail as some programs quote it: "From: …", followed by more of its kind. */
const HEAD = /^\s*\*?\p{L}[\p{L} -]{1,20}:\*?\s+\S/u;

/**
 * What somebody wrote in an answer: without the mail it answers, in whatever language its introduction stands, and
 * without the signature. Quoted lines in between go, the words under them stay.
 */
export function ownWords(text: string): string {
  const lines = text.replace(/\r\n?/g, '\n').split('\n');
  const end = lines.findIndex(
    (line, place) => SIGNATURE.test(line) || DIVIDER.test(line) || isQuotedHead(lines, place),
  );
  const kept = end < 0 ? lines : lines.slice(0, end);
  const quoted = kept.map((line) => QUOTED.test(line));
  const own = kept.filter((_, place) => !quoted[place] && !introduces(kept, quoted, place));
  return own
    .join('\n')
    .replace(/\n{3,}/g, '\n\n')
    .trim();
}

/** "On Wed 20 Jan Ylva wrote:", over one or two lines: ends with a colon, stands right before what is quoted. */
function introduces(lines: readonly string[], quoted: readonly boolean[], place: number): boolean {
  const next = nextFilled(lines, place);
  if (next < 0 || lines[place]!.trim() === '') return false;
  if (quoted[next]) return /:\s*$/.test(lines[place]!);
  const second = nextFilled(lines, next);
  const follows = next === place + 1 && second >= 0 && quoted[second] === true;
  return follows && /:\s*$/.test(lines[next]!) && /[<@]|\d{4}|\d{1,2}[:.]\d{2}/.test(lines[place]!);
}

function nextFilled(lines: readonly string[], place: number): number {
  const next = lines.findIndex((line, index) => index > place && line.trim() !== '');
  return next;
}

/** Three lines like "From: …", "Sent: …", "To: …" one after the other, one of them with an address. */
function isQuotedHead(lines: readonly string[], place: number): boolean {
  const three = lines.slice(place, place + 3);
  return (
    three.length === 3 &&
    three.every((line) => HEAD.test(line)) &&
    three.some((line) => /@/.test(line))
  );
}
