import { DEG } from '../ephemeris/constants';
import type { MoonTable } from '../ephemeris/table';
import { atmosphereLossDb, atmosphereNoiseK } from './atmosphere';
import { beamFillLossDb } from './beamFill';
import { fromDb, toDb } from './decibel';
import { dopplerHz } from './doppler';
import { PairGeometry, type StationView } from './geometry';
import type { LinkModel, WayModel } from './model';
import { moonNoiseK } from './moonNoise';
import { moonDiameterDeg, pathLossDb } from './pathLoss';
import { HALF_POWER_DB, meetingLossDb, polarizationOffsetDeg } from './polarization';
import { SkyAlongPath } from './skyPath';
import { spreadHz } from './spread';
import { spreadLossDb } from './spreadLoss';
import { sunNoiseK } from './sun';
import type { Terminal } from './terminal';

/** Figures of one direction at one instant. */
export interface DirectionFigures {
  receivedPowerDbw: number;
  /** Noise at the receiving antenna; sky, Moon and Sun behind the atmosphere, K. */
  skyTemperatureK: number;
  moonTemperatureK: number;
  sunTemperatureK: number;
  atmosphereTemperatureK: number;
  systemTemperatureK: number;
  /** Both passages, up and down. */
  atmosphereLossDb: number;
  atmosphereUpDb: number;
  atmosphereDownDb: number;
  beamFillLossDb: number;
  polarizationLossDb: number;
  /** Both antennas. */
  pointingLossDb: number;
  spreadLossDb: number;
  /** In 2500 Hz. */
  snrDb: number;
  marginDb: number;
  /** That this direction's messages are read within the slot. */
  chance: number;
}

const LN_BOLTZMANN_BANDWIDTH_DB = toDb(1.380649e-23 * 2500);

/**
 * One pair's budget over the span of a Moon table, quick and without allocation: the object's own fields are
 * overwritten by each call of `compute`.
 */
export class LinkMoment {
  timeMs = Number.NaN;
  /** Whether the Moon's centre stands above both geometric horizons. */
  moonUp = false;
  pathLossDb = 0;
  /** First to second station; the same back. */
  dopplerHz = 0;
  /** Limb to limb. */
  spreadHz = 0;
  /** 0 … below 180. */
  polarizationOffsetDeg = 0;
  /** First to second, second to first. */
  readonly directions: readonly [DirectionFigures, DirectionFigures] = [noFigures(), noFigures()];
  /** Of the whole contact within the slot; 0 while the Moon is not up for both. */
  contactChance = 0;
  readonly geometry: PairGeometry;
  readonly #sky: readonly [SkyAlongPath, SkyAlongPath];

  constructor(
    readonly model: LinkModel,
    table: MoonTable,
  ) {
    const [first, second] = model.terminals;
    this.geometry = new PairGeometry(table, model.sites[0], model.sites[1]);
    const sky = new SkyAlongPath(table, first.beam);
    const same = first.beam.beamwidthDeg === second.beam.beamwidthDeg;
    this.#sky = [sky, same ? sky : new SkyAlongPath(table, second.beam)];
  }

  /** Only `timeMs` and `moonUp`: tells whether the rest is worth computing. */
  look(timeMs: number): boolean {
    this.timeMs = timeMs;
    this.geometry.computeElevations(timeMs);
    this.moonUp = this.geometry.first.sinElevation > 0 && this.geometry.second.sinElevation > 0;
    return this.moonUp;
  }

  /** Everything at an instant within the table. With the Moon below a horizon the atmosphere is that of 1°. */
  compute(timeMs: number): void {
    this.look(timeMs);
    const { geometry, model } = this;
    geometry.computeRest(timeMs);
    const { first, second } = geometry;
    const { frequencyMhz } = model;
    this.pathLossDb = pathLossDb(frequencyMhz, first.rangeKm, second.rangeKm);
    this.dopplerHz = dopplerHz(frequencyMhz, first.rangeRateMps, second.rangeRateMps);
    this.spreadHz = spreadHz(frequencyMhz, first.libration, second.libration);
    this.polarizationOffsetDeg = polarizationOffsetDeg(first.parallacticDeg, second.parallacticDeg);
    this.#direction(0, first, second);
    this.#direction(1, second, first);
    this.contactChance = this.moonUp ? this.#contactChance() : 0;
  }

  /** The lower margin of the two directions, dB. */
  get marginDb(): number {
    return Math.min(this.directions[0].marginDb, this.directions[1].marginDb);
  }

  #direction(way: 0 | 1, from: StationView, to: StationView): void {
    const { model } = this;
    const wayModel: WayModel = model.ways[way];
    const terminal = model.terminals[way === 0 ? 1 : 0];
    const figures = this.directions[way];
    figures.atmosphereUpDb = atmosphereLossDb(model.atmosphere, from.sinElevation);
    figures.atmosphereDownDb = atmosphereLossDb(model.atmosphere, to.sinElevation);
    figures.atmosphereLossDb = figures.atmosphereUpDb + figures.atmosphereDownDb;
    const diameterDeg = moonDiameterDeg(to.rangeKm);
    figures.beamFillLossDb = beamFillLossDb(
      model.frequencyMhz,
      diameterDeg,
      model.terminals[0].beamwidthDeg,
      model.terminals[1].beamwidthDeg,
    );
    figures.polarizationLossDb = meetingLossDb(wayModel.meeting, this.polarizationOffsetDeg);
    figures.pointingLossDb = wayModel.pointingLossDb;
    figures.receivedPowerDbw =
      wayModel.fixedDbw -
      this.pathLossDb -
      figures.atmosphereLossDb -
      figures.beamFillLossDb -
      figures.polarizationLossDb -
      figures.pointingLossDb;
    this.#noise(figures, terminal, to, diameterDeg, way);
    figures.snrDb =
      figures.receivedPowerDbw - toDb(figures.systemTemperatureK) - LN_BOLTZMANN_BANDWIDTH_DB;
    figures.spreadLossDb = spreadLossDb(model.mode, this.spreadHz * model.halfPowerShare);
    figures.marginDb = figures.snrDb - figures.spreadLossDb - model.mode.thresholdDb;
    figures.chance = this.moonUp ? this.#directionChance(wayModel, figures.marginDb) : 0;
  }

  #noise(
    figures: DirectionFigures,
    terminal: Terminal,
    view: StationView,
    diameterDeg: number,
    way: 0 | 1,
  ): void {
    const { atmosphere, moon } = this.model;
    const through = fromDb(-figures.atmosphereDownDb);
    const brightnessK = moon.meanK + moon.swingK * this.geometry.phaseTerm;
    const moonK = moonNoiseK(brightnessK, diameterDeg, terminal.beamwidthDeg);
    figures.skyTemperatureK = this.#sky[way === 0 ? 1 : 0].at(this.timeMs) * through;
    figures.moonTemperatureK = moonK * terminal.pointingShare * through;
    figures.sunTemperatureK =
      sunNoiseK(terminal.sun, view.sunSeparationDeg, view.sunElevationDeg) * through;
    figures.atmosphereTemperatureK = atmosphereNoiseK(atmosphere, figures.atmosphereDownDb);
    const surroundings = terminal.measured
      ? Math.max(figures.skyTemperatureK - terminal.coldSkyK, 0)
      : figures.skyTemperatureK + figures.atmosphereTemperatureK;
    figures.systemTemperatureK =
      terminal.steadyK + surroundings + figures.moonTemperatureK + figures.sunTemperatureK;
  }

  #directionChance({ meeting }: WayModel, marginDb: number): number {
    const { chance } = this.model;
    return meeting.kind === 'unknown'
      ? chance.directionAtUnknownAngle(marginDb + HALF_POWER_DB)
      : chance.direction(marginDb);
  }

  #contactChance(): number {
    const { chance, ways } = this.model;
    const [there, back] = this.directions;
    const thereUnknown = ways[0].meeting.kind === 'unknown';
    const backUnknown = ways[1].meeting.kind === 'unknown';
    if (!thereUnknown && !backUnknown) return chance.contact(there.marginDb, back.marginDb);
    return chance.contactAtUnknownAngle(
      there.marginDb + (thereUnknown ? HALF_POWER_DB : 0),
      thereUnknown,
      back.marginDb + (backUnknown ? HALF_POWER_DB : 0),
      backUnknown,
      this.polarizationOffsetDeg + this.model.extraDeg,
    );
  }

  /** Airless elevation at the first (0) or second (1) station, degrees. */
  elevationDeg(station: 0 | 1): number {
    const view = station === 0 ? this.geometry.first : this.geometry.second;
    return Math.asin(view.sinElevation) / DEG;
  }
}

function noFigures(): DirectionFigures {
  return {
    receivedPowerDbw: NaN,
    skyTemperatureK: NaN,
    moonTemperatureK: NaN,
    sunTemperatureK: NaN,
    atmosphereTemperatureK: NaN,
    systemTemperatureK: NaN,
    atmosphereLossDb: NaN,
    atmosphereUpDb: NaN,
    atmosphereDownDb: NaN,
    beamFillLossDb: NaN,
    polarizationLossDb: NaN,
    pointingLossDb: NaN,
    spreadLossDb: NaN,
    snrDb: NaN,
    marginDb: NaN,
    chance: NaN,
  };
}
