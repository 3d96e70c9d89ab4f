import { describe, expect, it } from 'vitest';
import { pairMatrix, type MatrixStation } from '~/domain/activity/matrix';
import { matrixView } from '~/domain/activity/matrixView';
import type { RosterStation } from '~/domain/activity/views';
import type { LinkSetup } from '~/domain/link/setup';
import { DAY_MS, HOUR_MS, MINUTE_MS } from '~/domain/time/interval';
import { findCommonWindows } from '~/domain/window';
import { judgedAt, judgeOf } from '~/domain/window/judge';

const span = { startMs: Date.UTC(2027, 1, 13), endMs: Date.UTC(2027, 1, 13) + 2 * DAY_MS };
const SETUP: LinkSetup = {
  antenna: { kind: 'dish', diameterM: 2.4, apertureEfficiency: 0.55 },
  polarization: 'rightCircular',
  powerAtFeedW: 150,
  receive: { kind: 'measured', systemTemperatureK: 60 },
};
const station = (
  id: string,
  latitudeDeg: number,
  longitudeDeg: number,
  more: Partial<MatrixStation> = {},
): MatrixStation => ({
  id,
  callSign: id,
  site: { latitudeDeg, longitudeDeg, heightM: 0 },
  sky: { elevationFromDeg: 5 },
  usable: [span],
  setup: SETUP,
  ...more,
});
const stations = [
  station('a', 58.4, 15.65),
  station('b', 43.9, -71.85, {
    usable: [{ startMs: span.startMs + 12 * HOUR_MS, endMs: span.endMs }],
  }),
  station('c', 36.55, 138.6, {
    sky: {
      elevationFromDeg: 5,
      blocked: [
        {
          azimuthFromDeg: 90,
          azimuthToDeg: 180,
          elevationFromDeg: 0,
          elevationToDeg: 40,
          name: 'ridge',
        },
      ],
    },
  }),
  station('d', 50, 10, { setup: null }),
];
const question = {
  ...span,
  stations,
  frequencyMhz: 1296.1,
  mode: 'q65-60c',
  slotMinutes: 30,
};
const pairs = pairMatrix(question);

describe('the matrix', () => {
  it('has the windows that a search for each pair by itself finds', () => {
    for (const [index, one] of stations.entries()) {
      for (const other of stations.slice(index + 1)) {
        const { windows } = findCommonWindows({
          ...span,
          stations: [one, other],
          minimumMinutes: 30,
        });
        const found = pairs.find(({ a, b }) => a === one.id && b === other.id);
        const plain = windows.map(({ startMs, endMs }) => ({ startMs, endMs }));
        expect(found?.windows ?? [], `${one.id} ${other.id}`).toEqual(plain);
        if (found) {
          const sum = plain.reduce((total, { startMs, endMs }) => total + endMs - startMs, 0);
          expect(found.lengthMs).toBe(sum);
        }
      }
    }
    expect(pairs.length).toBeGreaterThan(2);
  });

  it('says the best margin as the judge of windows does, and looks at every part of them', () => {
    const pair = pairs.find(({ a, b }) => a === 'a' && b === 'b')!;
    const judge = judgeOf(stations.slice(0, 2), 1296.1, 'q65-60c');
    const at = judgedAt(judge, pair.bestMs);
    expect(pair.best.db).toBeCloseTo(at.db, 1);
    expect(pair.best.basis).toBe('margin');
    for (const { startMs, endMs } of pair.windows) {
      for (let atMs = startMs; atMs < endMs; atMs += 5 * MINUTE_MS) {
        expect(judgedAt(judge, atMs).db).toBeLessThan(pair.best.db + 0.3);
      }
    }
    expect(pair.chance).toBeGreaterThan(0);
    expect(pair.chance).toBeLessThanOrEqual(1);
  });

  it('judges by the path alone where equipment is not known', () => {
    const pair = pairs.find(({ b }) => b === 'd')!;
    expect(pair.best.basis).toBe('degradation');
    expect(pair.chance).toBeNull();
  });

  it('asks for a window in which a slot fits', () => {
    const longest = Math.max(
      ...pairs.flatMap(({ windows }) => windows.map(({ startMs, endMs }) => endMs - startMs)),
    );
    const slotMinutes = Math.ceil(longest / MINUTE_MS) + 1;
    expect(pairMatrix({ ...question, slotMinutes })).toEqual([]);
  });
});

describe('the table of a band', () => {
  const roster = stations.map(
    ({ id }, index) =>
      ({
        stationId: id,
        place: index + 1,
        answer: id === 'd' ? 'notComing' : 'coming',
        bands: id === 'c' ? ['432'] : ['1296'],
      }) as unknown as RosterStation,
  );
  it('leaves out who does not come or does not have the band, and finds a pair from either side', () => {
    const view = matrixView({
      band: '1296',
      roster,
      pairs,
      wishes: [{ stationId: 'b', partnerId: 'a', kind: 'want', priority: 3 }],
      wished: [{ a: 'a', b: 'b', priority: 3, bands: ['1296'] }],
    });
    expect(view.stations.map(({ stationId }) => stationId)).toEqual(['a', 'b']);
    expect(view.cell('b', 'a')).toEqual(view.cell('a', 'b'));
    expect(view.cell('b', 'a')).toMatchObject({ priority: 3, never: false });
    expect(view.wishes).toBe(1);
    expect(view.unreachable).toEqual([]);
  });
});
