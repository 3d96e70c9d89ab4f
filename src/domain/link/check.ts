import type { Site } from '../sky/limits';
import type { Antenna, Polarization, ReceiveStage } from '../station/setup';
import { LinkInputError } from './inputError';
import { modeFigures, type ModeFigures } from './modes';
import type { LinkReceive, LinkSetup, LinkStation } from './setup';

export const LOWEST_FREQUENCY_MHZ = 30;
export const HIGHEST_FREQUENCY_MHZ = 100_000;

const POLARIZATIONS: readonly Polarization[] = [
  'horizontal',
  'vertical',
  'rightCircular',
  'leftCircular',
  'rotatable',
];

/** Throws LinkInputError unless the value is a number from `from` to `to`. */
function within(
  path: string,
  what: string,
  value: number,
  from: number,
  to: number,
  unit: string,
): void {
  if (typeof value === 'number' && value >= from && value <= to) return;
  throw new LinkInputError(path, `${what} must lie between ${from} and ${to}${unit}.`);
}

/** As `within`, but `above` itself is not allowed. */
function above(
  path: string,
  what: string,
  value: number,
  limit: number,
  to: number,
  unit: string,
): void {
  if (typeof value === 'number' && value > limit && value <= to) return;
  throw new LinkInputError(
    path,
    `${what} must be more than ${limit}${unit} and at most ${to}${unit}.`,
  );
}

export function checkFrequency(frequencyMhz: number, path = 'frequencyMhz'): void {
  if (frequencyMhz >= LOWEST_FREQUENCY_MHZ && frequencyMhz <= HIGHEST_FREQUENCY_MHZ) return;
  throw new LinkInputError(
    path,
    'The frequency must lie between 30 MHz and 100 GHz (30 to 100 000 MHz).',
  );
}

export function checkMode(id: string, path = 'mode'): ModeFigures {
  const mode = modeFigures(id);
  if (!mode) throw new LinkInputError(path, `No mode is called “${id}”.`);
  return mode;
}

export function checkSolarFlux(fluxSfu: number, path = 'solarFlux10cmSfu'): void {
  above(path, 'The solar flux at 10.7 cm', fluxSfu, 0, 2000, ' SFU');
}

export function checkSlot(slotMinutes: number, path = 'slotMinutes'): void {
  within(path, 'The length of the slot', slotMinutes, 1, 1440, ' minutes');
}

export function checkTime(timeMs: number, path = 'time'): void {
  const from = Date.UTC(1950, 0, 1);
  const to = Date.UTC(2100, 0, 1);
  if (timeMs >= from && timeMs <= to) return;
  throw new LinkInputError(path, 'The time must lie between the years 1950 and 2100.');
}

/** Checks a station and everything in it; paths begin with `path`. */
export function checkStation(station: LinkStation, path: string): void {
  checkSite(station.site, `${path}.site`);
  checkSetup(station.setup, `${path}.setup`);
}

function checkSite(site: Site, path: string): void {
  within(`${path}.latitudeDeg`, 'The latitude', site.latitudeDeg, -90, 90, '°');
  within(`${path}.longitudeDeg`, 'The longitude', site.longitudeDeg, -180, 180, '°');
  within(`${path}.heightM`, 'The height', site.heightM, -500, 10_000, ' m');
}

export function checkSetup(setup: LinkSetup, path = 'setup'): void {
  checkAntenna(setup.antenna, `${path}.antenna`);
  if (!POLARIZATIONS.includes(setup.polarization)) {
    throw new LinkInputError(
      `${path}.polarization`,
      'The polarisation is none that is known here.',
    );
  }
  above(`${path}.powerAtFeedW`, 'The power at the feed', setup.powerAtFeedW, 0, 1e6, ' W');
  checkReceive(setup.receive, `${path}.receive`);
  within(
    `${path}.pointingErrorDeg`,
    'The pointing error',
    setup.pointingErrorDeg ?? 0,
    0,
    180,
    '°',
  );
}

function checkAntenna(antenna: Antenna, path: string): void {
  if (antenna.kind === 'dish') {
    above(`${path}.diameterM`, 'The diameter', antenna.diameterM, 0, 1000, ' m');
    above(
      `${path}.apertureEfficiency`,
      'The aperture efficiency',
      antenna.apertureEfficiency,
      0,
      1,
      '',
    );
    return;
  }
  within(`${path}.gainDbi`, 'The gain', antenna.gainDbi, -20, 100, ' dBi');
  if (antenna.beamwidthDeg === undefined) return;
  above(`${path}.beamwidthDeg`, 'The beamwidth', antenna.beamwidthDeg, 0, 360, '°');
}

function checkReceive(receive: LinkReceive, path: string): void {
  if (receive.kind === 'measured') {
    const { systemTemperatureK } = receive;
    above(`${path}.systemTemperatureK`, 'The system temperature', systemTemperatureK, 0, 1e6, ' K');
    return;
  }
  within(`${path}.spilloverK`, 'The spillover', receive.spilloverK ?? 0, 0, 1000, ' K');
  if (receive.kind === 'receiver') {
    const { receiverTemperatureK } = receive;
    within(
      `${path}.receiverTemperatureK`,
      'The receiver temperature',
      receiverTemperatureK,
      0,
      1e6,
      ' K',
    );
    return;
  }
  if (receive.stages.length === 0) {
    throw new LinkInputError(
      `${path}.stages`,
      'The receive chain has no stage. Name at least the receiver.',
    );
  }
  receive.stages.forEach((stage, index) => checkStage(stage, `${path}.stages.${index}`));
}

function checkStage(stage: ReceiveStage, path: string): void {
  if (stage.kind === 'amplifier') {
    within(`${path}.gainDb`, 'The gain of a stage', stage.gainDb, -100, 100, ' dB');
    within(`${path}.noiseFigureDb`, 'The noise figure', stage.noiseFigureDb, 0, 60, ' dB');
    return;
  }
  within(`${path}.lossDb`, 'The loss of a stage', stage.lossDb, 0, 100, ' dB');
  const physicalK = stage.physicalTemperatureK ?? 0;
  within(`${path}.physicalTemperatureK`, 'The physical temperature', physicalK, 0, 1000, ' K');
}
