/** "1296.065 MHz": to 1 kHz, without trailing zeros. */
export function formatFrequency(frequencyMhz: number): string {
  return `${Number(frequencyMhz.toFixed(3))} MHz`;
}
