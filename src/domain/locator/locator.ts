/**
 * Maidenhead locators on WGS 84: pairs of letters A–R, digits, letters a–x, digits, letters a–x, each
 * pair longitude first. Four, six, eight and ten characters are used; the fifth pair by common use.
 */

export type LocatorLength = 4 | 6 | 8 | 10;

export interface Position {
  latitudeDeg: number;
  /** East positive, −180 … 180. */
  longitudeDeg: number;
}

/** Edges of a cell in degrees; `east` is never over 180. */
export interface LocatorCell {
  west: number;
  east: number;
  south: number;
  north: number;
}

export interface DecodedLocator extends Position {
  cell: LocatorCell;
}

/** The text is not a locator; the message is a sentence saying what is wrong. */
export class LocatorError extends Error {
  constructor(sentence: string) {
    super(sentence);
    this.name = 'LocatorError';
  }
}

interface Pair {
  /** Number of steps in each direction. */
  steps: number;
  letters: 'upper' | 'lower' | null;
  words: string;
}

const PAIRS: readonly Pair[] = [
  { steps: 18, letters: 'upper', words: 'letters A to R' },
  { steps: 10, letters: null, words: 'digits' },
  { steps: 24, letters: 'lower', words: 'letters A to X' },
  { steps: 10, letters: null, words: 'digits' },
  { steps: 24, letters: 'lower', words: 'letters A to X' },
];

const ORDINALS = ['first', 'second', 'third', 'fourth', 'fifth'];

function valueOf(character: string, pair: Pair): number {
  const value = pair.letters
    ? character.toUpperCase().charCodeAt(0) - 65
    : character.charCodeAt(0) - 48;
  return character.length === 1 && value >= 0 && value < pair.steps ? value : -1;
}

function characterOf(value: number, pair: Pair): string {
  if (!pair.letters) return String(value);
  return String.fromCharCode((pair.letters === 'upper' ? 65 : 97) + value);
}

/** The values of the pairs; throws `LocatorError`. Surrounding spaces and the case of letters do not matter. */
function valuesOf(text: string): { east: number; north: number; pair: Pair }[] {
  const trimmed = text.trim();
  if (trimmed === '') throw new LocatorError('A locator is needed, for example JO97ee.');
  const characters = [...trimmed];
  const shown = characters.length > 16 ? `${characters.slice(0, 16).join('')}…` : trimmed;
  if (![4, 6, 8, 10].includes(characters.length)) {
    throw new LocatorError(
      `The locator “${shown}” has ${characters.length} characters; it needs 4, 6, 8 or 10.`,
    );
  }
  return PAIRS.slice(0, characters.length / 2).map((pair, index) => {
    const first = characters[2 * index]!;
    const second = characters[2 * index + 1]!;
    const east = valueOf(first, pair);
    const north = valueOf(second, pair);
    if (east < 0 || north < 0) {
      throw new LocatorError(
        `The ${ORDINALS[index]} pair of the locator “${shown}” is “${first}${second}”; it must be two ${pair.words}.`,
      );
    }
    return { east, north, pair };
  });
}

/**
 * Centre and cell of a locator. Throws `LocatorError`.
 */
export function locatorToPosition(text: string): DecodedLocator {
  // Counted in whole cells, so that a long locator loses nothing to sums of fractions.
  let eastCells = 0;
  let northCells = 0;
  let cellsAround = 1;
  for (const { east, north, pair } of valuesOf(text)) {
    eastCells = eastCells * pair.steps + east;
    northCells = northCells * pair.steps + north;
    cellsAround *= pair.steps;
  }
  const longitude = (cells: number) => (cells * 360) / cellsAround - 180;
  const latitude = (cells: number) => (cells * 180) / cellsAround - 90;
  return {
    latitudeDeg: latitude(northCells + 0.5),
    longitudeDeg: longitude(eastCells + 0.5),
    cell: {
      west: longitude(eastCells),
      east: longitude(eastCells + 1),
      south: latitude(northCells),
      north: latitude(northCells + 1),
    },
  };
}

/**
 * The locator of the cell that holds the position, south and west edges included. Latitude 90 and
 * longitude 180 belong to the last cell. Throws `LocatorError` outside −90 … 90 and −180 … 180.
 */
export function positionToLocator(
  { latitudeDeg, longitudeDeg }: Position,
  length: LocatorLength,
): string {
  if (!(Math.abs(latitudeDeg) <= 90)) {
    throw new LocatorError(`Latitude ${latitudeDeg} is outside −90 … 90.`);
  }
  if (!(Math.abs(longitudeDeg) <= 180)) {
    throw new LocatorError(`Longitude ${longitudeDeg} is outside −180 … 180.`);
  }
  // Always found to ten characters and then cut, so that a shorter locator is the start of a longer one.
  let east = finestCell((longitudeDeg + 180) / 360);
  let north = finestCell((latitudeDeg + 90) / 180);
  let locator = '';
  for (const pair of [...PAIRS].reverse()) {
    locator =
      characterOf(east % pair.steps, pair) + characterOf(north % pair.steps, pair) + locator;
    east = Math.floor(east / pair.steps);
    north = Math.floor(north / pair.steps);
  }
  return locator.slice(0, length);
}

const FINEST_CELLS = PAIRS.reduce((cells, pair) => cells * pair.steps, 1);

/** Index of the ten-character cell; within a millionth of a cell of an edge counts as on it. */
function finestCell(share: number): number {
  const at = share * FINEST_CELLS;
  const nearest = Math.round(at);
  const index = Math.abs(at - nearest) < 1e-6 ? nearest : Math.floor(at);
  return Math.min(index, FINEST_CELLS - 1);
}

export function isLocator(text: string): boolean {
  try {
    valuesOf(text);
    return true;
  } catch {
    return false;
  }
}

/** The locator in its usual case, "JO97ee12ab". Throws `LocatorError`. */
export function normalizeLocator(text: string): string {
  return valuesOf(text)
    .map(({ east, north, pair }) => characterOf(east, pair) + characterOf(north, pair))
    .join('');
}

/**
 * The first `length` characters in their usual case; a locator that is shorter stays as it is.
 * Two characters (the field) are allowed here, for stations that show no more. Throws `LocatorError`.
 */
export function cutLocator(locator: string, length: 2 | LocatorLength): string {
  return normalizeLocator(locator).slice(0, length);
}
