/** Amateur bands on which moonbounce is worked, named by their usual centre in MHz. */
export const BANDS = [
  { id: '50', label: '50 MHz', centreMhz: 50.2, fromMhz: 50, toMhz: 54 },
  { id: '144', label: '144 MHz', centreMhz: 144.1, fromMhz: 144, toMhz: 148 },
  { id: '222', label: '222 MHz', centreMhz: 222.1, fromMhz: 222, toMhz: 225 },
  { id: '432', label: '432 MHz', centreMhz: 432.1, fromMhz: 420, toMhz: 450 },
  { id: '902', label: '902 MHz', centreMhz: 902.1, fromMhz: 902, toMhz: 928 },
  { id: '1296', label: '1296 MHz', centreMhz: 1296.1, fromMhz: 1240, toMhz: 1300 },
  { id: '2304', label: '2304 MHz', centreMhz: 2304.1, fromMhz: 2300, toMhz: 2450 },
  { id: '3400', label: '3400 MHz', centreMhz: 3400.1, fromMhz: 3300, toMhz: 3500 },
  { id: '5760', label: '5760 MHz', centreMhz: 5760.1, fromMhz: 5650, toMhz: 5925 },
  { id: '10368', label: '10 GHz', centreMhz: 10368.1, fromMhz: 10000, toMhz: 10500 },
  { id: '24048', label: '24 GHz', centreMhz: 24048.1, fromMhz: 24000, toMhz: 24250 },
  { id: '47088', label: '47 GHz', centreMhz: 47088.1, fromMhz: 47000, toMhz: 47200 },
] as const;

export type BandId = (typeof BANDS)[number]['id'];

export const BAND_IDS = BANDS.map((band) => band.id) as [BandId, ...BandId[]];

export function bandById(id: BandId): (typeof BANDS)[number] {
  return BANDS.find((band) => band.id === id)!;
}

/** The band that holds the frequency, or null. */
export function bandOfFrequency(frequencyMhz: number): BandId | null {
  return (
    BANDS.find((band) => frequencyMhz >= band.fromMhz && frequencyMhz <= band.toMhz)?.id ?? null
  );
}
