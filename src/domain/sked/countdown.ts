export interface CountdownPart {
  figure: string;
  unit: 'd' | 'h' | 'min' | 's';
}

/**
 * Time left as figures with their units: days only where there are some. Every part but the first keeps two digits, so
 * that nothing moves when a second passes. Nothing is left at and after the end: "0 min 00 s".
 */
export function countdownParts(leftMs: number): CountdownPart[] {
  const seconds = Math.max(0, Math.floor(leftMs / 1000));
  const figures: [number, CountdownPart['unit']][] = [
    [Math.floor(seconds / 86_400), 'd'],
    [Math.floor(seconds / 3600) % 24, 'h'],
    [Math.floor(seconds / 60) % 60, 'min'],
    [seconds % 60, 's'],
  ];
  const first = figures.findIndex(([figure]) => figure > 0);
  const shown = figures.slice(first < 0 ? 2 : Math.min(first, 2));
  return shown.map(([figure, unit], index) => ({
    unit,
    figure: index === 0 ? String(figure) : String(figure).padStart(2, '0'),
  }));
}
