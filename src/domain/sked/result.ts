import type { ModeId } from '../station/modes';
import { listOf, RESULT_WORDS } from './view';
import type { SkedResult } from './types';

/** What one party says of a sked. The reports are as typed; empty where nothing was given. */
export interface SaidResult {
  callSign: string;
  result: SkedResult;
  reportSent: string;
  reportReceived: string;
}

const RESULTS = Object.keys(RESULT_WORDS) as SkedResult[];

/**
 * Where the parties contradict each other, in sentences; empty while they agree, or only one has spoken. Reports are
 * compared between two stations only: among more nobody can say which of them one was for.
 */
export function disagreements(said: readonly SaidResult[]): string[] {
  const spoken = RESULTS.map((result) => ({
    result,
    by: said.filter((one) => one.result === result).map((one) => one.callSign),
  })).filter(({ by }) => by.length > 0);
  const results =
    spoken.length > 1
      ? [
          `${spoken
            .map(
              ({ result, by }) =>
                `${listOf(by)} ${by.length > 1 ? 'say' : 'says'} ${RESULT_WORDS[result]}`,
            )
            .join(', ')}.`,
        ]
      : [];
  const [first, second, ...more] = said;
  if (!first || !second || more.length > 0) return results;
  return [...results, ...reportsDiffer(first, second), ...reportsDiffer(second, first)];
}

function reportsDiffer(from: SaidResult, to: SaidResult): string[] {
  if (from.reportSent === '' || to.reportReceived === '') return [];
  if (plainReport(from.reportSent) === plainReport(to.reportReceived)) return [];
  return [
    `${from.callSign} sent ${from.reportSent}, ${to.callSign} received ${to.reportReceived}.`,
  ];
}

/** A report as far as its sign, case, spaces and a "dB" behind it do not matter: "−07 dB" and "-7" are one. */
export function plainReport(report: string): string {
  return report
    .normalize('NFKC')
    .replace(/[\u2010-\u2015\u2212]/g, '-')
    .toUpperCase()
    .replace(/\s+/g, '')
    .replace(/DB$/, '')
    .replace(/^(R?)([+-]?)0*(\d+)$/, (_all, roger: string, sign: string, digits: string) => {
      return `${roger}${sign === '-' ? '-' : ''}${digits}`;
    });
}

/** What a report looks like in a mode, for the note under the field. */
export function reportNote(mode: ModeId): string {
  if (mode === 'cw') return 'RST such as 529, or T, M, O and RO.';
  if (mode === 'ssb') return 'RS such as 53.';
  return 'dB as decoded, such as −21 or R−23; O or RO where you use them.';
}

export const LONGEST_REPORT = 20;
