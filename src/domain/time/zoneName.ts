/** Locales in which the short name of a zone is asked for, in this order: each knows only its own region's names. */
const LOCALES = ['en-GB', 'en-US', 'en-AU', 'en-NZ', 'en-CA', 'en-ZA', 'en-IN', 'en-IE'];

const formats = new Map<string, Intl.DateTimeFormat>();

function nameFormat(locale: string, timeZone: string): Intl.DateTimeFormat {
  const key = `${locale} ${timeZone}`;
  let format = formats.get(key);
  if (!format) {
    format = new Intl.DateTimeFormat(locale, { timeZone, timeZoneName: 'short' });
    formats.set(key, format);
  }
  return format;
}

/**
 * Short name of the zone at that instant: "UTC", "CET", "EST", "AEDT"; where no name is in use, the
 * difference to UTC: "UTC+5:45", "UTC−3". Throws `RangeError` for an unknown zone.
 */
export function zoneName(atMs: number, timeZone: string): string {
  let fallback = 'UTC';
  for (const locale of LOCALES) {
    const part = nameFormat(locale, timeZone)
      .formatToParts(atMs)
      .find((piece) => piece.type === 'timeZoneName');
    const name = part?.value ?? 'UTC';
    if (!/[+\-\u2212]\d/.test(name)) return name;
    fallback = name;
  }
  return fallback.replace(/^GMT/, 'UTC').replace('-', '\u2212');
}

/** Whether the name is a zone that this runtime can compute with, such as "Europe/Berlin" or "UTC". */
export function isTimeZone(name: string): boolean {
  if (!/^[A-Za-z][A-Za-z0-9_+\-/]*$/.test(name)) return false;
  try {
    new Intl.DateTimeFormat('en-GB', { timeZone: name });
    return true;
  } catch {
    return false;
  }
}
