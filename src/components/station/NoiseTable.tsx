import type { NoiseRecord } from '../../domain/station/noiseRecord';
import { formatNumber } from '../../domain/time/format';
import { Button } from '../ui/Button';
import { METHOD_WORDS, recordDay } from './noiseWords';

interface Props {
  /** Of one band, newest first. */
  records: NoiseRecord[];
  newestUsed: boolean;
  onRemove: (record: NoiseRecord) => void;
}

/** Noise records of one band, with what was measured between and what follows. */
export function NoiseTable({ records, newestUsed, onRemove }: Props) {
  return (
    <table className="table--cards table">
      <thead>
        <tr>
          <th scope="col">Day, UTC</th>
          <th scope="col">Between</th>
          <th scope="col" className="figure">
            Step, dB
          </th>
          <th scope="col" className="figure">
            Receiver, K
          </th>
          <th scope="col" className="figure">
            G/T, dB/K
          </th>
          <th scope="col" className="figure">
            System, K
          </th>
          <th scope="col">
            <span className="sr-only">Remove</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {records.map((record, index) => {
          const { figures, measurement } = record;
          return (
            <tr key={record.id}>
              <th scope="row" data-label="Day, UTC">
                {recordDay(record.measuredOn)}
              </th>
              <td data-label="Between">
                <span>
                  {METHOD_WORDS[measurement.method]}{' '}
                  <span className="label">
                    {measurement.method === 'hotCold'
                      ? `${formatNumber(measurement.hotK)} and ${formatNumber(measurement.coldK, 1)} K`
                      : `${formatNumber(measurement.fluxSfu)} SFU ${measurement.fluxAt === '10cm' ? 'at 10.7 cm' : 'at the band'}, ${formatNumber(measurement.gainDbi, 1)} dBi`}
                  </span>
                  {record.note ? <span className="quiet block">{record.note}</span> : null}
                </span>
              </td>
              <td data-label="Step, dB" className="figure">
                {formatNumber(measurement.yDb, 2)}
              </td>
              <td data-label="Receiver, K" className="figure">
                {formatNumber(figures.receiverTemperatureK ?? NaN, 1)}
              </td>
              <td data-label="G/T, dB/K" className="figure">
                {formatNumber(figures.gainOverTemperatureDb ?? NaN, 1)}
              </td>
              <td data-label="System, K" className="figure">
                <span>
                  <strong>{formatNumber(figures.systemTemperatureK, 1)}</strong>
                  {newestUsed && index === 0 ? <span className="label block">in use</span> : null}
                </span>
              </td>
              <td className="text-right max-sm:justify-end!">
                <Button look="bare" onClick={() => onRemove(record)}>
                  Remove
                  <span className="sr-only"> the record of {recordDay(record.measuredOn)}</span>
                </Button>
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}
