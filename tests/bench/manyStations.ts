import type { WindowStation } from '../../src/domain/window';

/** Always the same numbers, 0 … below 1: mulberry-like mixing of a counter. */
function numbers(): () => number {
  let state = 20_270_101;
  return () => {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) | 0;
    return ((state ^ (state >>> 16)) >>> 0) / 4_294_967_296;
  };
}

/**
 * Invented stations all over the inhabited latitudes, each with sky limits of its own: a lowest elevation for all,
 * a highest one for a third, an azimuth range for every fourth, a blocked sector for every tenth.
 */
export function manyStations(count: number): WindowStation[] {
  const next = numbers();
  return Array.from({ length: count }, (_, index) => {
    const site = {
      latitudeDeg: 110 * next() - 45,
      longitudeDeg: 360 * next() - 180,
      heightM: 800 * next(),
    };
    const turnDeg = 60 * next();
    return {
      callSign: `Q${index}`,
      site,
      sky: {
        elevationFromDeg: 15 * next(),
        ...(index % 3 === 0 ? { elevationToDeg: 60 + 25 * next() } : {}),
        ...(index % 4 === 0 ? { azimuthFromDeg: 40 + turnDeg, azimuthToDeg: 250 + turnDeg } : {}),
        ...(index % 10 === 0
          ? {
              blocked: [
                {
                  azimuthFromDeg: 100 + turnDeg,
                  azimuthToDeg: 120 + turnDeg,
                  elevationFromDeg: 0,
                  elevationToDeg: 25,
                },
              ],
            }
          : {}),
      },
    };
  });
}
