import { describe, expect, it } from 'vitest';
import { heldSlot, slotAround, slotAt, wholeMinutes } from '~/components/window/slot';
import { nearestAtClock } from '~/components/window/SlotFields';
import { MINUTE_MS } from '~/domain/time/interval';

const at = (clock: string, day = '2027-02-13') => Date.parse(`${day}T${clock}:00Z`);
const WINDOW = { startMs: at('16:00') + 12_345, endMs: at('23:40') + 54_321 };
const slot = (from: string, to: string) => ({ startMs: at(from), endMs: at(to) });

describe('a slot', () => {
  it('is an hour from the quarter hour that was pressed', () => {
    expect(slotAt(WINDOW, at('18:07'))).toEqual(slot('18:00', '19:00'));
    expect(slotAt(WINDOW, at('18:52'))).toEqual(slot('18:45', '19:45'));
  });

  it('stays inside the window, on whole minutes', () => {
    expect(wholeMinutes(WINDOW)).toEqual(slot('16:01', '23:40'));
    expect(slotAt(WINDOW, at('16:02'))).toEqual(slot('16:01', '17:01'));
    expect(slotAt(WINDOW, at('23:39'))).toEqual(slot('22:40', '23:40'));
  });

  it('is the whole window where that is shorter', () => {
    const short = { startMs: at('20:00') + 1, endMs: at('20:35') };
    expect(slotAt(short, at('20:20'))).toEqual(slot('20:01', '20:35'));
    expect(slotAround(short, at('20:10'))).toEqual(slot('20:01', '20:35'));
  });

  it('lies about the best moment', () => {
    expect(slotAround(WINDOW, at('18:30'))).toEqual(slot('18:00', '19:00'));
    expect(slotAround(WINDOW, WINDOW.endMs)).toEqual(slot('22:40', '23:40'));
  });

  it('gives way at the edge that is dragged', () => {
    const before = slot('18:00', '19:00');
    expect(heldSlot(WINDOW, before, slot('15:00', '19:00'))).toEqual(slot('16:01', '19:00'));
    expect(heldSlot(WINDOW, before, slot('18:00', '23:59'))).toEqual(slot('18:00', '23:40'));
    expect(heldSlot(WINDOW, before, slot('18:58', '19:00'))).toEqual(slot('18:50', '19:00'));
    expect(heldSlot(WINDOW, before, slot('18:00', '17:00'))).toEqual(slot('18:00', '18:10'));
  });
});

describe('a typed time', () => {
  it('is the nearest such time', () => {
    expect(nearestAtClock('22:15', at('21:00'))).toBe(at('22:15'));
    expect(nearestAtClock('00:30', at('23:00'))).toBe(at('00:30', '2027-02-14'));
    expect(nearestAtClock('2330', at('00:10'))).toBe(at('23:30', '2027-02-12'));
    expect(nearestAtClock('9:05', at('09:00') + 20 * MINUTE_MS)).toBe(at('09:05'));
  });

  it.each(['24:00', '12:60', 'noon', '', '123'])('is none when it is %s', (text) => {
    expect(nearestAtClock(text, at('21:00'))).toBe(
      text === '123' ? at('01:23', '2027-02-14') : null,
    );
  });
});
