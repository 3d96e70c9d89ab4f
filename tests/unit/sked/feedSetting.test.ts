import { describe, expect, it } from 'vitest';
import { buildMoonTable, moonSamples, observerAt } from '~/domain/ephemeris';
import { parallacticFromSkyDeg } from '~/domain/link/polarization';
import { feedSentences, turnDeg } from '~/domain/sked/feedSetting';
import { HOUR_MS } from '~/domain/time/interval';
import { NORTH, SKED, SOUTH, WEST } from './stations';

type Vector = [number, number, number];
const cross = (a: Vector, b: Vector): Vector => [
  a[1] * b[2] - a[2] * b[1],
  a[2] * b[0] - a[0] * b[2],
  a[0] * b[1] - a[1] * b[0],
];
const dot = (a: Vector, b: Vector) => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
const scaled = (a: Vector, by: number): Vector => [a[0] * by, a[1] * by, a[2] * by];
const plus = (a: Vector, b: Vector): Vector => [a[0] + b[0], a[1] + b[1], a[2] + b[2]];

describe('how far to turn a feed', () => {
  const table = buildMoonTable(SKED);

  /** The direction of a horizontal feed turned clockwise as seen from behind the dish, fixed to the Earth. */
  function feed(station: typeof NORTH, timeMs: number, clockwiseDeg: number): Vector {
    const observer = observerAt(station.site);
    const out = new Float64Array(3);
    table.moonDirection(observer, timeMs, out);
    const towards = plus(
      plus(
        scaled([observer.east[0], observer.east[1], 0], out[0]!),
        scaled(observer.north, out[1]!),
      ),
      scaled(observer.up, out[2]!),
    );
    const rightRaw = cross(towards, observer.up);
    const right = scaled(rightRaw, 1 / Math.hypot(...rightRaw));
    const above = cross(right, towards);
    const angle = (clockwiseDeg * Math.PI) / 180;
    return plus(scaled(right, Math.cos(angle)), scaled(above, -Math.sin(angle)));
  }

  it.each([
    [NORTH, WEST],
    [WEST, NORTH],
    [NORTH, SOUTH],
    [SOUTH, WEST],
  ])('makes it lie as the partner’s does, by vectors', (own, partner) => {
    for (const timeMs of [SKED.startMs, SKED.startMs + HOUR_MS / 2, SKED.endMs]) {
      const angle = (station: typeof NORTH) => {
        const [sample] = moonSamples(station.site, [timeMs], table);
        return parallacticFromSkyDeg(
          station.site.latitudeDeg,
          sample!.azimuthDeg,
          sample!.elevationDeg,
        );
      };
      const turn = turnDeg({
        ownParallacticDeg: angle(own),
        partnerParallacticDeg: angle(partner),
      });
      expect(Math.abs(turn)).toBeLessThanOrEqual(90);
      const aligned = Math.abs(dot(feed(own, timeMs, turn), feed(partner, timeMs, 0)));
      // Both look at the Moon from places up to 2° apart.
      expect(aligned).toBeGreaterThan(0.998);
      if (Math.abs(turn) > 10 && Math.abs(turn) < 80) {
        expect(Math.abs(dot(feed(own, timeMs, -turn), feed(partner, timeMs, 0)))).toBeLessThan(
          0.95,
        );
      }
    }
  });
});

describe('what to set at the feed', () => {
  const angles = { ownParallacticDeg: 41, partnerParallacticDeg: -60 };
  const same = { start: angles, middle: angles, end: angles };
  const say = (own: Parameters<typeof feedSentences>[0], partner: typeof own, mhz: number) =>
    feedSentences(own, partner, 'QB7TID', mhz, same).join(' ');

  it('circular: the sense, and a warning when crossed', () => {
    expect(say('rightCircular', 'rightCircular', 1296)).toContain('Nothing to turn.');
    expect(say('rightCircular', 'leftCircular', 1296)).toContain('crossed');
    expect(say('horizontal', 'rightCircular', 432)).toContain('3 dB');
  });

  it('rotatable: how far and which way', () => {
    expect(say('rotatable', 'horizontal', 1296)).toContain('turn it 79° anticlockwise');
    expect(say('rotatable', 'vertical', 1296)).toContain('turn it 11° clockwise');
  });

  it('below 500 MHz the ionosphere is not known, above it hardly counts', () => {
    expect(say('horizontal', 'horizontal', 144)).toContain('Faraday rotation is not known');
    expect(say('horizontal', 'horizontal', 144)).not.toContain('dB are lost');
    expect(say('horizontal', 'horizontal', 1296)).toContain('14.4 dB are lost both ways');
  });

  it('says what it can without equipment', () => {
    expect(say(null, null, 1296)).toContain('Offset between the two horizontals');
  });
});
