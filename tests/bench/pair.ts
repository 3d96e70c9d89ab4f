import type { WindowStation } from '../../src/domain/window';

function hills(lowestDeg: number, roughnessDeg: number) {
  return Array.from({ length: 36 }, (_, index) => ({
    azimuthDeg: index * 10,
    elevationDeg: lowestDeg + roughnessDeg * Math.abs(Math.sin(index * 1.7)),
  }));
}

/** Two stations with every limit a sky can have. */
export const pair: [WindowStation, WindowStation] = [
  {
    callSign: 'QA1LUN',
    site: { latitudeDeg: 50, longitudeDeg: 10, heightM: 200 },
    sky: {
      elevationFromDeg: 5,
      elevationToDeg: 70,
      azimuthFromDeg: 60,
      azimuthToDeg: 300,
      transmitElevationFromDeg: 10,
      blocked: [
        { azimuthFromDeg: 120, azimuthToDeg: 140, elevationFromDeg: 0, elevationToDeg: 25 },
        { azimuthFromDeg: 205, azimuthToDeg: 212, elevationFromDeg: 0, elevationToDeg: 40 },
      ],
      horizon: hills(3, 4),
    },
  },
  {
    callSign: 'QB2MOO',
    site: { latitudeDeg: 40, longitudeDeg: -75, heightM: 0 },
    sky: {
      elevationFromDeg: 8,
      elevationToDeg: 80,
      azimuthFromDeg: 320,
      azimuthToDeg: 280,
      transmitElevationFromDeg: 12,
      blocked: [{ azimuthFromDeg: 95, azimuthToDeg: 110, elevationFromDeg: 0, elevationToDeg: 45 }],
      horizon: hills(5, 6),
    },
  },
];
