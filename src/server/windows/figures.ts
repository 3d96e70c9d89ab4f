/** An instant as the API writes it: UTC with Z, fractions of a second only where there are some. */
export function instantText(timeMs: number): string {
  return new Date(timeMs).toISOString().replace('.000Z', 'Z');
}

export function rounded(value: number, decimals: number): number {
  const scale = 10 ** decimals;
  return Math.round(value * scale) / scale + 0;
}

const ANGLE_DECIMALS = 6;
export const angle = (valueDeg: number) => rounded(valueDeg, ANGLE_DECIMALS);

/** An azimuth: rounding must not make it 360. */
export const bearing = (azimuthDeg: number) => angle(azimuthDeg) % 360;
