import { formatNumber } from '../../domain/time/format';
import type { WindowLayers } from '../../domain/window/layers';
import { lostWords, type LimitDegrees } from '../../domain/window/sentences';

interface Props {
  lost: WindowLayers['lost'];
  /** Hours asked for and found. */
  totalHours: number;
  foundHours: number;
  degreesOf: LimitDegrees;
}

/** Where the other hours went: each is counted once, to the first limit that forbids it. */
export function LostPanel({ lost, totalHours, foundHours, degreesOf }: Props) {
  return (
    <section className="lost" aria-labelledby="lost-head">
      <h2 id="lost-head">Why not the other hours</h2>
      <p className="quiet">
        Of {formatNumber(totalHours)} hours, {formatNumber(foundHours, 1)} are in a window. Each
        other hour is counted once, to the first reason that forbids it: what cannot be changed
        comes first.
      </p>
      <table className="table">
        <thead>
          <tr>
            <th scope="col">Station</th>
            <th scope="col">Reason</th>
            <th scope="col" className="figure">
              Hours
            </th>
          </tr>
        </thead>
        <tbody>
          {lost.map((entry) => (
            <tr key={`${entry.callSign}${entry.reason}${entry.name ?? ''}`}>
              <th scope="row">{entry.callSign ?? 'Everyone'}</th>
              <td>{lostWords(entry, degreesOf)}</td>
              <td className="figure">{formatNumber(entry.hours, 1)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
