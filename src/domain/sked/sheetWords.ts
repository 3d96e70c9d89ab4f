import { LONG_CW_FROM_MHZ } from '../link/modes';
import type { ModeId } from '../station/modes';
import { modeById } from '../station/modes';
import { formatAngle, formatDoppler, formatNumber, formatSigned } from '../time/format';
import type { CalibrationSteps } from './calibration';
import { formatDial } from './dial';
import type { PairSheet } from './hourSheet';
import type { TrPlan } from './periods';
import { listOf } from './view';

/** "2.5 min", "60 s", "5 min". */
export function periodWords(periodMs: number): string {
  const seconds = periodMs / 1000;
  return seconds < 120 ? `${seconds} s` : `${formatNumber(seconds / 60, seconds % 60 ? 1 : 0)} min`;
}

/** Length of the periods, where it comes from and who begins, in sentences. */
export function planSentences(
  plan: TrPlan,
  { mode, frequencyMhz, eastFirst }: { mode: ModeId; frequencyMhz: number; eastFirst: boolean },
): string[] {
  const { label } = modeById(mode);
  const length = `Periods of ${periodWords(plan.periodMs)}`;
  const why =
    mode !== 'cw'
      ? `as ${label} has them`
      : frequencyMhz < LONG_CW_FROM_MHZ
        ? 'the usual ones for CW below 432 MHz; two minutes are in use too, so tell each other if you mean them'
        : 'the usual ones for CW from 432 MHz up';
  const side = eastFirst ? 'eastern' : 'western';
  const first =
    plan.order.length === 2
      ? `${plan.order[0]}, the ${side} station counted from the date line, transmits first, from the hour or half hour.`
      : `From the hour they take turns by longitude, the ${side} station counted from the date line first: ${listOf(plan.order)}.`;
  return [`${length}, ${why}.`, first];
}

/** One thing to look at, and how. */
export interface Advice {
  lead: string;
  text: string;
}

/** What to look at before the first period; null of `steps` where the own equipment is not known. */
export function checksBefore(
  steps: CalibrationSteps | null,
  elevations: { lowest: number; highest: number },
  lowestTransmitDeg: number | null,
): Advice[] {
  const decibel = (value: number) => `${formatNumber(value, 1)} dB`;
  return [
    {
      lead: 'People.',
      text: 'Nobody in the beam, near the feed or on the way there. Say so aloud if you are not alone.',
    },
    {
      lead: 'Elevation.',
      text:
        `The Moon stands between ${formatAngle(elevations.lowest)} and ${formatAngle(elevations.highest)} for you. ` +
        (lowestTransmitDeg === null
          ? 'You have set no lowest elevation for transmitting.'
          : elevations.lowest < lowestTransmitDeg
            ? `Below ${formatAngle(lowestTransmitDeg)} you do not transmit.`
            : `Your lowest elevation for transmitting is ${formatAngle(lowestTransmitDeg)}.`),
    },
    {
      lead: 'Wind.',
      text: 'Forecast and gusts read. The way to stow the dish is free, and works without mains.',
    },
    {
      lead: 'T/R changeover, without power first.',
      text: 'One step after the other: feed relay with preamplifier, transverter, bias of the amplifier, drive; back in reverse, under 100 ms in all. Then with little power, then with all.',
    },
    {
      lead: 'Noise.',
      text: steps
        ? `From cold sky expect ${decibel(steps.loadDb)} to a 290 K load at the feed, ${decibel(steps.sunDb)} to the Sun (at ${steps.fluxSfu} SFU on 10.7 cm), ${steps.moonDb < 0.1 ? 'nothing to see of the Moon' : `${decibel(steps.moonDb)} to the Moon`}. Less by a decibel or more: look at the preamplifier, its relay and its supply first.`
        : 'Compare cold sky with a load, the Sun or the Moon. With your equipment described, the steps to expect would stand here.',
    },
    { lead: 'Clock.', text: 'Set within half a second: the periods follow it.' },
  ];
}

/** What to do when nothing is heard, in the order of what costs least and helps most. */
export function nothingHeard(
  pairs: readonly PairSheet[],
  steps: CalibrationSteps | null,
  frequencyMhz: number,
  circular: boolean,
): Advice[] {
  const several = pairs.length > 1;
  const partners = listOf(pairs.map(({ partner }) => partner));
  const { middle } = pairs[0]!;
  const hertz = (value: number) => formatDoppler(value, frequencyMhz);
  const each = (figure: (pair: PairSheet) => string) =>
    pairs.map((pair) => `${figure(pair)}${several ? ` (${pair.partner})` : ''}`).join(', ');
  const dials = each((pair) => `${formatDial(frequencyMhz, pair.middle.ownDial.receiveHz)} kHz`);
  const dopplers = each((pair) => hertz(pair.middle.mutualHz));
  const moonDb = steps?.moonDb ?? 0;
  return [
    {
      lead: 'Pointing.',
      text:
        'Look along the boom, or at the shadow of the feed on the dish: is it the Moon?' +
        (moonDb >= 0.1
          ? ` Off it and back, the noise rises by ${formatNumber(moonDb, 1)} dB.`
          : ' Your dish does not see its noise, so the eye or the Sun has to do.'),
    },
    {
      lead: 'Own echo.',
      text: `In a period of yours send a dash and listen: it comes back after 2.5 s, ${hertz(middle.ownEchoHz)} beside what you sent. No echo at all is often one weak side, and it is then yours to find.`,
    },
    {
      lead: 'Dial and sign.',
      text: `You listen on ${dials}. Tune on both sides as far as the mutual Doppler, ${dopplers}, and by twice that: a partner with the wrong sign or another convention is there.`,
    },
    circular
      ? {
          lead: 'Polarisation.',
          text: 'Is the sense right, and the relay of the feed on the right port? Swap the ports for one period.',
        }
      : {
          lead: 'Polarisation.',
          text: 'Turn by 90° for two of the partner’s periods, then back. What turns nothing waits.',
        },
    {
      lead: 'Periods.',
      text: `Listen through one of your own periods: ${several ? 'one of them' : partners} may have begun with the other one.`,
    },
    {
      lead: 'Time.',
      text: 'Compare the clock with another source. Two seconds are too much for a digital mode.',
    },
    {
      lead: 'Level.',
      text: 'Preamplifier on, noise up when it is switched on, no overload, filter open, right port.',
    },
    { lead: 'Then ask.', text: `Write to ${partners}, on the page of the sked or as you agreed.` },
  ];
}

/** "they hear you +9.1 dB, you hear them +6.1 dB" */
export function marginWords(theyHearDb: number, youHearDb: number): string {
  return `they hear you ${formatSigned(theyHearDb)} dB, you hear them ${formatSigned(youHearDb)} dB`;
}
