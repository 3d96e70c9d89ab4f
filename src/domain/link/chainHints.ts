import type { ReceiveStage } from '../station/setup';
import { formatNumber } from '../time/format';
import { toDb } from './decibel';
import { chainTemperatureK, stageSharesK } from './receiveChain';

/** One thing that could be changed about a chain, and what the chain would then be. */
export interface ChainHint {
  words: string;
  /** How much the system temperature would fall, K. */
  savedK: number;
  /** The same as a gain in sensitivity, dB. */
  savedDb: number;
}

/** What is tried: ordinary parts, none at the edge of what can be had. */
const SECOND_AMPLIFIER = { gainDb: 18, noiseFigureDb: 0.5 } as const;
const FIRST_AMPLIFIER = { gainDb: 25, noiseFigureDb: 0.5 } as const;
const STEP_DB = 0.1;

/** Under this a change is not worth a sentence; another amplifier is more work than the rest. */
const LEAST_SAVED_DB = 0.1;
const LEAST_SAVED_BY_AMPLIFIER_DB = 0.3;
const MOST_HINTS = 3;

/**
 * Changes worth making, greatest first, each computed by putting the changed chain through Friis' formula; `othersK`
 * is sky and ground. Empty when nothing tried gains 0.1 dB, and another
 * amplifier 0.3 dB.
 */
export function chainHints(stages: readonly ReceiveStage[], othersK: number): ChainHint[] {
  const nowK = chainTemperatureK(stages) + othersK;
  return trials(stages)
    .map(({ words, changed }) => {
      const thenK = chainTemperatureK(changed) + othersK;
      const least = changed.length > stages.length ? LEAST_SAVED_BY_AMPLIFIER_DB : LEAST_SAVED_DB;
      return { words, savedK: nowK - thenK, savedDb: toDb(nowK / thenK), least };
    })
    .filter(({ savedDb, least }) => savedDb >= least)
    .map(({ words, savedK, savedDb }) => ({ words, savedK, savedDb }))
    .sort((a, b) => b.savedDb - a.savedDb)
    .slice(0, MOST_HINTS);
}

interface Trial {
  words: string;
  changed: ReceiveStage[];
}

function trials(stages: readonly ReceiveStage[]): Trial[] {
  const first = stages.findIndex((stage) => stage.kind === 'amplifier' && stage.gainDb > 0);
  if (first === -1) {
    return [
      {
        words: `An amplifier of ${figures(FIRST_AMPLIFIER)} at the feed would bury all that follows`,
        changed: [{ kind: 'amplifier', ...FIRST_AMPLIFIER }, ...stages],
      },
    ];
  }
  return [...secondAmplifier(stages, first), ...before(stages, first), ...quieter(stages, first)];
}

function secondAmplifier(stages: readonly ReceiveStage[], first: number): Trial[] {
  if (first === stages.length - 1) return [];
  const shares = stageSharesK(stages);
  let worst = first + 1;
  for (let k = worst; k < stages.length; k += 1) if (shares[k]! > shares[worst]!) worst = k;
  return [
    {
      words: `Another amplifier of ${figures(SECOND_AMPLIFIER)} behind ${stageName(stages, first)} would bury ${stageName(stages, worst)}`,
      changed: [
        ...stages.slice(0, first + 1),
        { kind: 'amplifier', ...SECOND_AMPLIFIER },
        ...stages.slice(first + 1),
      ],
    },
  ];
}

/** Losses in front of the first amplifier: less of the greatest, or the amplifier in front of it. */
function before(stages: readonly ReceiveStage[], first: number): Trial[] {
  let worst = -1;
  let worstDb = 0;
  stages.slice(0, first).forEach((stage, index) => {
    if (stage.kind === 'loss' && stage.lossDb > worstDb) [worst, worstDb] = [index, stage.lossDb];
  });
  if (worst === -1) return [];
  const name = stageName(stages, worst);
  const less = Math.min(STEP_DB, worstDb);
  const lighter: ReceiveStage = { ...stages[worst]!, kind: 'loss', lossDb: worstDb - less };
  const trial: Trial[] = [
    {
      words: `${formatNumber(less, 1)} dB less loss in ${name}`,
      changed: stages.map((stage, index) => (index === worst ? lighter : stage)),
    },
  ];
  if (worstDb > 0.5) {
    const rest = stages.filter((_, index) => index !== first);
    trial.push({
      words: `${capital(stageName(stages, first))} in front of ${name}`,
      changed: [...rest.slice(0, worst), stages[first]!, ...rest.slice(worst)],
    });
  }
  return trial;
}

function quieter(stages: readonly ReceiveStage[], first: number): Trial[] {
  const stage = stages[first]!;
  if (stage.kind !== 'amplifier' || stage.noiseFigureDb <= STEP_DB) return [];
  const better = { ...stage, noiseFigureDb: stage.noiseFigureDb - STEP_DB };
  return [
    {
      words: `A noise figure ${formatNumber(STEP_DB, 1)} dB better in ${stageName(stages, first)}`,
      changed: stages.map((old, index) => (index === first ? better : old)),
    },
  ];
}

function figures({ gainDb, noiseFigureDb }: { gainDb: number; noiseFigureDb: number }): string {
  return `${gainDb} dB with a noise figure of ${formatNumber(noiseFigureDb, 1)} dB`;
}

/** "the cable" in the keeper's own word, else "stage 3". */
export function stageName(stages: readonly ReceiveStage[], index: number): string {
  const name = stages[index]?.name?.trim();
  return name ? `“${name}”` : `stage ${index + 1}`;
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
