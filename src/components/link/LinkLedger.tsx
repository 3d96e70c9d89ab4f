import { qualityFigure } from '../../domain/window/quality';
import {
  ledgerTerms,
  type LedgerLine,
  type LedgerSheet,
  type LinkSheets,
} from '../../domain/window/ledgerSheet';
import { FigureLabel } from '../ui/FigureLabel';

/** Both directions side by side, from the transmitter to the margin. Works as plain HTML too. */
export function LinkLedger({ sheets }: { sheets: LinkSheets }) {
  return (
    <div className="ledgers">
      {sheets.directions.map((sheet) => (
        <Direction key={sheet.from} sheet={sheet} />
      ))}
    </div>
  );
}

function Direction({ sheet }: { sheet: LedgerSheet }) {
  const { from, to, signal, noise, margin } = sheet;
  return (
    <div className="ledger">
      <h3 className="ledger__way">
        {from} <span aria-hidden="true">→</span>
        <span className="sr-only">to</span> {to}
      </h3>
      <table className="ledger__table table">
        <caption className="sr-only">
          Signal from {from} to {to}
        </caption>
        <thead>
          <tr>
            <th scope="col">Term</th>
            <th scope="col" className="figure">
              dB
            </th>
            <th scope="col" className="figure">
              Level, dBW
            </th>
          </tr>
        </thead>
        <tbody>
          {signal.map((line) => (
            <Line key={line.key} line={line} />
          ))}
          <tr className="ledger__sum">
            <th scope="row" colSpan={2}>
              <FigureLabel figure="margin">Margin</FigureLabel>, {margin.step}
            </th>
            <td className="figure">
              <span className={`chip chip--${margin.step}`}>{qualityFigure(margin)} dB</span>
            </td>
          </tr>
        </tbody>
      </table>
      <table className="ledger__table table">
        <caption className="sr-only">Noise at {to}</caption>
        <thead>
          <tr>
            <th scope="col">Noise at {to}</th>
            <th scope="col" className="figure">
              K
            </th>
            <th scope="col" className="figure">
              Sum, K
            </th>
          </tr>
        </thead>
        <tbody>
          {noise.map((line) => (
            <Line key={line.key} line={line} />
          ))}
        </tbody>
      </table>
    </div>
  );
}

function Line({ line }: { line: LedgerLine }) {
  return (
    <tr className={line.sum ? 'ledger__sum' : undefined}>
      <th scope="row">
        <FigureLabel figure={line.key}>{line.label}</FigureLabel>
        {line.detail ? (
          <>
            {' '}
            <span className="ledger__detail">{line.detail}</span>
          </>
        ) : null}
      </th>
      <td className="figure">{line.value}</td>
      <td className="figure ledger__level">{line.level}</td>
    </tr>
  );
}

/** What each term is, folded away until asked for. */
export function LedgerTerms({ sheets }: { sheets: LinkSheets }) {
  return (
    <details className="ledger__terms">
      <summary>What each term is, and its source</summary>
      <dl>
        {ledgerTerms(sheets).map(({ label, sentence }) => (
          <div key={label}>
            <dt>{label}</dt>
            <dd>{sentence}</dd>
          </div>
        ))}
      </dl>
    </details>
  );
}
