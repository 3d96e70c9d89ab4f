import { buildMoonTable } from '../ephemeris/table';
import { ATMOSPHERE_TABLE_ENDS_MHZ } from './atmosphere';
import { checkTime } from './check';
import { dialShifts, dopplerHz, type DialConvention, type DialShift } from './doppler';
import { ledgerOf, type Ledger } from './ledger';
import { linkModel, type LinkModel, type LinkOptions } from './model';
import { LinkMoment } from './moment';
import { echoDelayS } from './pathLoss';
import { typicalFaraday } from './polarization';
import type { LinkStation } from './setup';

export interface LinkRequest extends LinkOptions {
  stations: readonly [LinkStation, LinkStation];
  frequencyMhz: number;
  mode: string;
  timeMs: number;
}

export interface LinkDirection {
  from: string;
  to: string;
  transmitGainDbi: number;
  receiveGainDbi: number;
  receivedPowerDbw: number;
  skyTemperatureK: number;
  moonTemperatureK: number;
  sunTemperatureK: number;
  atmosphereTemperatureK: number;
  atmosphereLossDb: number;
  systemTemperatureK: number;
  polarizationLossDb: number;
  pointingLossDb: number;
  beamFillLossDb: number;
  spreadLossDb: number;
  snrDb: number;
  thresholdDb: number;
  marginDb: number;
  chance: number;
  ledger: Ledger;
}

export interface LinkResult {
  /** Whether the Moon's centre stands above both geometric horizons; if not, every chance is 0. */
  moonUp: boolean;
  elevationDeg: [number, number];
  pathLossDb: number;
  dopplerHz: number;
  spreadHz: number;
  halfPowerSpreadHz: number;
  polarizationOffsetDeg: number;
  /** Overhead; see `typicalFaraday`. */
  faradayOneWayDeg: { typical: number; least: number; most: number };
  echoDelayS: number;
  dialShifts: Record<DialConvention, { first: DialShift; second: DialShift }>;
  /** Of the whole contact within the slot. */
  contactChance: number;
  slotMinutes: number;
  periods: number;
  directions: [LinkDirection, LinkDirection];
  /** What a reader should know about these figures, in sentences. */
  notes: string[];
}

const HALF_SPAN_MS = 3_600_000;

/**
 * The whole link between two stations at one instant, both directions, with every term. Airless elevations, clear
 * air, feeds as set up. Expect ±2 dB against a careful measurement. Throws LinkInputError.
 */
export function computeLink(request: LinkRequest): LinkResult {
  checkTime(request.timeMs);
  const model = linkModel(request.stations, request.frequencyMhz, request.mode, request);
  const { timeMs } = request;
  const table = buildMoonTable({ startMs: timeMs - HALF_SPAN_MS, endMs: timeMs + HALF_SPAN_MS });
  const moment = new LinkMoment(model, table);
  moment.compute(timeMs);
  return describe(moment);
}

/** The moment as it stands, as an answer of its own. */
export function describe(moment: LinkMoment): LinkResult {
  const { model, geometry } = moment;
  const { frequencyMhz } = model;
  const { first, second } = geometry;
  return {
    moonUp: moment.moonUp,
    elevationDeg: [moment.elevationDeg(0), moment.elevationDeg(1)],
    pathLossDb: moment.pathLossDb,
    dopplerHz: moment.dopplerHz,
    spreadHz: moment.spreadHz,
    halfPowerSpreadHz: moment.spreadHz * model.halfPowerShare,
    polarizationOffsetDeg: moment.polarizationOffsetDeg,
    faradayOneWayDeg: typicalFaraday(frequencyMhz),
    echoDelayS: echoDelayS(first.rangeKm, second.rangeKm),
    dialShifts: dialShifts(
      dopplerHz(frequencyMhz, first.rangeRateMps),
      dopplerHz(frequencyMhz, second.rangeRateMps),
    ),
    contactChance: moment.contactChance,
    slotMinutes: model.slotMinutes,
    periods: model.chance.periods,
    directions: [directionOf(moment, 0), directionOf(moment, 1)],
    notes: notesOn(model, moment),
  };
}

function directionOf(moment: LinkMoment, way: 0 | 1): LinkDirection {
  const { model, pathLossDb } = moment;
  const figures = moment.directions[way];
  const other = way === 0 ? 1 : 0;
  const { atmosphereUpDb: _up, atmosphereDownDb: _down, ...shown } = figures;
  return {
    from: model.callSigns[way],
    to: model.callSigns[other],
    transmitGainDbi: model.terminals[way].gainDbi,
    receiveGainDbi: model.terminals[other].gainDbi,
    ...shown,
    thresholdDb: model.mode.thresholdDb,
    ledger: ledgerOf(model, way, figures, pathLossDb),
  };
}

function notesOn(model: LinkModel, moment: LinkMoment): string[] {
  const notes: string[] = [];
  if (!moment.moonUp) {
    notes.push(
      'The Moon stands below the horizon of at least one station: no contact is possible now.',
    );
  }
  if (model.ways.some((way) => way.meeting.kind === 'unknown')) {
    notes.push(
      'Faraday rotation is unknown at this frequency: 3 dB stand for the mean, and the chance counts every angle.',
    );
  }
  if (model.frequencyMhz > ATMOSPHERE_TABLE_ENDS_MHZ * 1.01) {
    notes.push(
      'The atmosphere is taken as at 47 GHz. Near 60 GHz oxygen absorbs far more, which is not counted here.',
    );
  }
  return notes;
}
