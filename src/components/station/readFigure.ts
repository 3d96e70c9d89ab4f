/**
 * The number in a field: undefined for an empty one, NaN for what is no number. Takes a decimal comma,
 * U+2212 as minus, and a unit of degrees or per cent behind it.
 */
export function readFigure(text: string): number | undefined {
  const trimmed = text.replace(/[\s\u00a0]/g, '').replace(/[°%]$/, '');
  if (trimmed === '') return undefined;
  const plain = trimmed.replace('\u2212', '-').replace(',', '.');
  return /^[+-]?(\d+(\.\d*)?|\.\d+)$/.test(plain) ? Number(plain) : NaN;
}

/** The number as it stands in a field. */
export function showFigure(value: number | undefined): string {
  if (value === undefined || !Number.isFinite(value)) return '';
  return String(Math.round(value * 1e6) / 1e6 || 0).replace('-', '\u2212');
}
