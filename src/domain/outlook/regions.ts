import type { WindowStation } from '../window/types';

/**
 * Parts of the world as a few places spread over where people operate, on round coordinates; nobody's station. Hours
 * in common between two of them are the mean over every place here and every place there.
 */
const PLACES = {
  Europe: [
    [60, 15],
    [52, 0],
    [50, 20],
    [42, -5],
    [42, 15],
    [55, 35],
  ],
  'North America': [
    [45, -120],
    [35, -115],
    [42, -95],
    [32, -95],
    [45, -75],
    [32, -82],
  ],
  'South America': [
    [5, -70],
    [-8, -40],
    [-15, -55],
    [-23, -47],
    [-34, -60],
    [-36, -71],
  ],
  'East Asia': [
    [43, 142],
    [36, 138],
    [36, 127],
    [40, 116],
    [30, 115],
    [24, 121],
  ],
  Oceania: [
    [-32, 117],
    [-20, 147],
    [-33, 150],
    [-37, 145],
    [-38, 176],
    [-44, 171],
  ],
  Africa: [
    [33, 5],
    [28, 31],
    [8, 0],
    [0, 37],
    [-18, 28],
    [-32, 25],
  ],
} as const;

export type Region = keyof typeof PLACES;

export const REGIONS = Object.keys(PLACES) as Region[];

/** Below this nobody is expected to reach: trees, houses and ground noise. */
export const REGION_LOWEST_DEG = 5;

/** The region of this name in any letter case, or null. */
export function regionNamed(name: string): Region | null {
  const wanted = name.trim().replaceAll(/\s+/g, ' ').toLowerCase();
  return REGIONS.find((region) => region.toLowerCase() === wanted) ?? null;
}

/** The places that stand for a region, as stations of a search. */
export function regionStations(region: Region): WindowStation[] {
  return PLACES[region].map(([latitudeDeg, longitudeDeg], index) => ({
    callSign: `${region} ${index + 1}`,
    site: { latitudeDeg, longitudeDeg, heightM: 0 },
    sky: { elevationFromDeg: REGION_LOWEST_DEG },
  }));
}
