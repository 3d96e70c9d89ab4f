import { chainHints } from '../../domain/link/chainHints';
import { COLD_SKY_ELEVATION_DEG, type ChainReport } from '../../domain/link/chainReport';
import { toDb } from '../../domain/link/decibel';
import type { ReceiveStage } from '../../domain/station/setup';
import { formatNumber } from '../../domain/time/format';

interface Props {
  stages: ReceiveStage[];
  report: ChainReport;
}

/** What the chain comes to, and what would better it. */
export function ChainResult({ stages, report }: Props) {
  const { sky, ground, receiverK, noiseFigureDb, systemK } = report;
  const othersK = sky.kelvin + ground.kelvin;
  const hints = chainHints(stages, othersK);
  const leftDb = toDb(systemK / othersK);
  return (
    <div className="stack">
      <p role="status" className="text-action">
        Receiver <strong>{formatNumber(receiverK, 1)}&nbsp;K</strong>, noise figure{' '}
        <strong>{formatNumber(noiseFigureDb, 2)}&nbsp;dB</strong>. System{' '}
        <strong>{formatNumber(systemK, 1)}&nbsp;K</strong> on the coldest sky on the Moon’s path,{' '}
        {COLD_SKY_ELEVATION_DEG}° up.
      </p>
      {hints.length > 0 ? (
        <ul className="m-0 list-none p-0">
          {hints.map((hint) => (
            <li key={hint.words} className="flex justify-between gap-4 border-b border-rule py-1.5">
              <span>{hint.words}</span>
              <span className="whitespace-nowrap">
                {formatNumber(-hint.savedK, 1)} K{' '}
                <span className="quiet">= +{formatNumber(hint.savedDb, 1)} dB</span>
              </span>
            </li>
          ))}
        </ul>
      ) : null}
      <p className="label">
        {hints.length > 0 ? 'Each change alone, computed for this chain. ' : ''}A receiver without
        noise would be {formatNumber(leftDb, 1)} dB better here, no more.
      </p>
    </div>
  );
}
