import { LEDGER_EXPLANATIONS, type NoiseKey, type SignalKey } from '../link/ledger';
import type { LinkDirection, LinkResult } from '../link/budget';
import { modeFigures } from '../link/modes';
import type { LinkSetup } from '../link/setup';
import { modeById, type ModeId } from '../station/modes';
import { formatNumber, formatSigned, formatUtc } from '../time/format';
import { qualityOfMargin, qualityWords, type Quality } from './quality';

/** One line of a ledger, ready to be shown. */
export interface LedgerLine {
  key: SignalKey | NoiseKey | 'received' | 'system';
  label: string;
  /** What the figure comes from: "150 W", "2.4 m dish". */
  detail: string | null;
  /** What the term adds, with its sign; empty where the level says it. */
  value: string;
  level: string;
  /** A sum of what stands above. */
  sum: boolean;
}

/** One direction, from the transmitter to the margin. */
export interface LedgerSheet {
  from: string;
  to: string;
  signal: LedgerLine[];
  noise: LedgerLine[];
  margin: Quality;
}

export interface LinkSheets {
  timeMs: number;
  mode: ModeId;
  bandLabel: string;
  directions: [LedgerSheet, LedgerSheet];
  /** "The weaker direction decides: QB7TID to QA1LUN." */
  weaker: string;
  contactChance: number;
  slotMinutes: number;
  notes: string[];
}

export const MODEL_ERROR_SENTENCE = 'Model error about ±2 dB.';

const LIGHT_KM_PER_S = 299_792.458;

/** A link's two ledgers in words and figures; `setups` in the order of its stations. */
export function linkSheets(
  result: LinkResult,
  setups: readonly [LinkSetup, LinkSetup],
  mode: ModeId,
  bandLabel: string,
  timeMs: number,
): LinkSheets {
  const there = sheetOf(result, 0, setups, mode);
  const back = sheetOf(result, 1, setups, mode);
  return {
    timeMs,
    mode,
    bandLabel,
    directions: [there, back],
    weaker: weakerSentence(there, back),
    contactChance: result.contactChance,
    slotMinutes: result.slotMinutes,
    notes: result.notes,
  };
}

function weakerSentence(there: LedgerSheet, back: LedgerSheet): string {
  const apartDb = there.margin.db - back.margin.db;
  if (Math.abs(apartDb) < 0.05) return 'Both directions are equally strong.';
  const { from, to } = apartDb < 0 ? there : back;
  return `The weaker direction decides: ${from} to ${to}.`;
}

function sheetOf(
  result: LinkResult,
  way: 0 | 1,
  setups: readonly [LinkSetup, LinkSetup],
  mode: ModeId,
): LedgerSheet {
  const direction = result.directions[way];
  const details = detailsOf(result, way, setups, mode);
  const signal = direction.ledger.signal.flatMap(({ key, value, level }): LedgerLine[] => {
    const overNoise = key === 'noiseFloor' || key === 'spread' || key === 'threshold';
    const line: LedgerLine = {
      key,
      label: LEDGER_EXPLANATIONS[key].label,
      detail: details[key] ?? null,
      value: key === 'transmitPower' ? '' : formatSigned(value, 1),
      level: overNoise ? `${formatSigned(level, 1)} dB` : formatNumber(level, 1),
      sum: false,
    };
    if (key !== 'receiveGain') return [line];
    return [line, sumLine('received', 'Received power', formatNumber(level, 1))];
  });
  const noise = direction.ledger.noise.map(({ key, value, level }): LedgerLine => ({
    key,
    label: LEDGER_EXPLANATIONS[key].label,
    detail: null,
    value: formatNumber(value, 1),
    level: formatNumber(level, 1),
    sum: false,
  }));
  noise.push(sumLine('system', 'System noise', formatNumber(direction.systemTemperatureK, 1)));
  return {
    from: direction.from,
    to: direction.to,
    signal,
    noise,
    margin: qualityOfMargin(direction.marginDb),
  };
}

function sumLine(key: 'received' | 'system', label: string, level: string): LedgerLine {
  return { key, label, detail: null, value: '', level, sum: true };
}

function detailsOf(
  result: LinkResult,
  way: 0 | 1,
  setups: readonly [LinkSetup, LinkSetup],
  mode: ModeId,
): Partial<Record<SignalKey, string>> {
  const direction = result.directions[way];
  const other = way === 0 ? 1 : 0;
  const up = (station: 0 | 1) => `${formatNumber(result.elevationDeg[station], 1)}° up`;
  const meanKm = (result.echoDelayS * LIGHT_KM_PER_S) / 2;
  const rotated = setups[0].polarization === 'rotatable' || setups[1].polarization === 'rotatable';
  return {
    transmitPower: `${wattWords(setups[way].powerAtFeedW)} W`,
    transmitGain: antennaWords(setups[way]),
    receiveGain: antennaWords(setups[other]),
    atmosphereUp: up(way),
    atmosphereDown: up(other),
    pathLoss: `${formatNumber(Math.round(meanKm / 10) * 10)} km`,
    ...(circular(setups[0]) || circular(setups[1]) || rotated
      ? {}
      : { polarization: `${formatNumber(result.polarizationOffsetDeg)}° between the feeds` }),
    noiseFloor: noiseWords(direction),
    spread: `${formatNumber(result.spreadHz, 1)} Hz limb to limb`,
    threshold: `${modeById(mode).label}, ${formatNumber(direction.thresholdDb, 1)} dB`,
  };
}

function noiseWords({ systemTemperatureK, ledger }: LinkDirection): string {
  const floor = ledger.signal.find(({ key }) => key === 'noiseFloor');
  return `${formatNumber(systemTemperatureK)} K, ${formatNumber(-(floor?.value ?? NaN), 1)} dBW`;
}

function circular({ polarization }: LinkSetup): boolean {
  return polarization === 'rightCircular' || polarization === 'leftCircular';
}

function wattWords(powerW: number): string {
  return formatNumber(powerW, powerW < 10 && powerW % 1 !== 0 ? 1 : 0);
}

function antennaWords({ antenna }: LinkSetup): string {
  return antenna.kind === 'dish'
    ? `${formatNumber(antenna.diameterM, antenna.diameterM % 1 === 0 ? 0 : 1)} m dish`
    : `${formatNumber(antenna.gainDbi, 1)} dBi`;
}

/** Every term of the sheets once, with what it is and where the mode's figure comes from. */
export function ledgerTerms({
  directions,
  mode,
}: LinkSheets): { label: string; sentence: string }[] {
  const keys = new Set(
    directions.flatMap(({ signal, noise }) => [...signal, ...noise].map(({ key }) => key)),
  );
  return [...keys].flatMap((key) => {
    if (key === 'received' || key === 'system') return [];
    const { label, sentence } = LEDGER_EXPLANATIONS[key];
    const source = key === 'threshold' ? ` Source: ${modeFigures(mode)!.source}` : '';
    return [{ label, sentence: `${sentence}${source}` }];
  });
}

/** The chance of a contact, for people: "63 %", "under 1 %", "over 99 %". */
export function chanceWords(chance: number): string {
  if (chance < 0.01) return 'under 1 %';
  return chance > 0.99 ? 'over 99 %' : `${formatNumber(chance * 100)} %`;
}

/** Both ledgers as plain text, to paste into a mail. */
export function ledgerText(sheets: LinkSheets): string {
  const [there, back] = sheets.directions;
  const head = [
    `Link of ${there.from} and ${there.to}, ${sheets.bandLabel}, ${modeById(sheets.mode).label}, ${formatUtc(sheets.timeMs, { withYear: true })}`,
    `${sheets.weaker} ${MODEL_ERROR_SENTENCE} Chance of a contact in ${sheets.slotMinutes} minutes: ${chanceWords(sheets.contactChance)}.`,
  ];
  return [head, directionText(there), directionText(back)]
    .map((lines) => lines.join('\n'))
    .join('\n\n');
}

function directionText({ from, to, signal, noise, margin }: LedgerSheet): string[] {
  const row = ({ label, detail, value, level }: LedgerLine) =>
    `${`${label}${detail ? ` (${detail})` : ''}`.padEnd(52)}${value.padStart(8)}${level.padStart(10)}`;
  return [
    `${from} to ${to}`,
    `${'Term'.padEnd(52)}${'dB'.padStart(8)}${'dBW'.padStart(10)}`,
    ...signal.map(row),
    `Margin: ${qualityWords(margin)}`,
    `${'Noise'.padEnd(52)}${'K'.padStart(8)}${'sum, K'.padStart(10)}`,
    ...noise.map(row),
  ];
}
