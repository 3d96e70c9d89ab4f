import { computeLink, type LinkDirection, type LinkResult } from '../../domain/link/budget';
import { LinkInputError } from '../../domain/link/inputError';
import {
  LEDGER_EXPLANATIONS,
  type LedgerTerm,
  type NoiseKey,
  type SignalKey,
} from '../../domain/link/ledger';
import { InvalidInput } from '../errors';
import { angle, rounded } from './figures';
import type { LinkAnswer, LinkCalculatorRequest } from './linkSchemas';

/** The link between two stations at one instant. Throws `InvalidInput` for what cannot be computed. */
export function computeLinkAnswer(request: LinkCalculatorRequest): LinkAnswer {
  const { stations, frequencyMhz, mode, time, solarFlux10cmSfu, slotMinutes } = request;
  try {
    return linkAnswer(
      computeLink({
        stations,
        frequencyMhz,
        mode,
        timeMs: time,
        solarFlux10cmSfu,
        chance: slotMinutes === undefined ? undefined : { slotMinutes },
      }),
    );
  } catch (error) {
    if (!(error instanceof LinkInputError)) throw error;
    throw new InvalidInput(error.message, [{ path: error.path, message: error.message }]);
  }
}

const decibel = (value: number) => rounded(value, 4);
const kelvin = (value: number) => rounded(value, 4);
const hertz = (value: number) => rounded(value, 4);
const share = (value: number) => rounded(value, 5);

function linkAnswer(link: LinkResult): LinkAnswer {
  const [first, second] = link.elevationDeg;
  const { typical, least, most } = link.faradayOneWayDeg;
  return {
    moonUp: link.moonUp,
    elevationsDeg: [angle(first), angle(second)],
    pathLossDb: decibel(link.pathLossDb),
    dopplerHz: hertz(link.dopplerHz),
    spreadHz: hertz(link.spreadHz),
    halfPowerSpreadHz: hertz(link.halfPowerSpreadHz),
    polarizationOffsetDeg: angle(link.polarizationOffsetDeg) % 180,
    faradayOneWayDeg: { typical: angle(typical), least: angle(least), most: angle(most) },
    echoDelayS: rounded(link.echoDelayS, 6),
    dialShifts: roundedShifts(link.dialShifts),
    contactChance: share(link.contactChance),
    slotMinutes: link.slotMinutes,
    periods: link.periods,
    directions: [directionAnswer(link.directions[0]), directionAnswer(link.directions[1])],
    notes: link.notes,
  };
}

function roundedShifts(shifts: LinkResult['dialShifts']): LinkAnswer['dialShifts'] {
  const shift = ({ transmitHz, receiveHz }: { transmitHz: number; receiveHz: number }) => ({
    transmitHz: hertz(transmitHz),
    receiveHz: hertz(receiveHz),
  });
  return Object.fromEntries(
    Object.entries(shifts).map(([name, { first, second }]) => [
      name,
      { first: shift(first), second: shift(second) },
    ]),
  ) as LinkAnswer['dialShifts'];
}

function directionAnswer(direction: LinkDirection): LinkAnswer['directions'][number] {
  const { ledger } = direction;
  return {
    from: direction.from,
    to: direction.to,
    transmitGainDbi: decibel(direction.transmitGainDbi),
    receiveGainDbi: decibel(direction.receiveGainDbi),
    receivedPowerDbw: decibel(direction.receivedPowerDbw),
    skyTemperatureK: kelvin(direction.skyTemperatureK),
    moonTemperatureK: kelvin(direction.moonTemperatureK),
    sunTemperatureK: kelvin(direction.sunTemperatureK),
    atmosphereTemperatureK: kelvin(direction.atmosphereTemperatureK),
    atmosphereLossDb: decibel(direction.atmosphereLossDb),
    systemTemperatureK: kelvin(direction.systemTemperatureK),
    polarizationLossDb: decibel(direction.polarizationLossDb),
    pointingLossDb: decibel(direction.pointingLossDb),
    beamFillLossDb: decibel(direction.beamFillLossDb),
    spreadLossDb: decibel(direction.spreadLossDb),
    snrDb: decibel(direction.snrDb),
    thresholdDb: direction.thresholdDb,
    marginDb: decibel(direction.marginDb),
    chance: share(direction.chance),
    ledger: { signal: ledger.signal.map(termAnswer), noise: ledger.noise.map(termAnswer) },
  };
}

function termAnswer({ key, value, level }: LedgerTerm<SignalKey | NoiseKey>) {
  const { label } = LEDGER_EXPLANATIONS[key];
  return { key, label, value: rounded(value, 4), level: rounded(level, 4) };
}
