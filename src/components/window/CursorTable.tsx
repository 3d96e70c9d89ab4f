import type { ReactNode } from 'react';
import type { MoonTable } from '../../domain/ephemeris';
import { dopplerHz, pathLossDb } from '../../domain/link';
import { REFERENCE_BANDWIDTH_HZ } from '../../domain/link/modes';
import type { LinkMoment } from '../../domain/link/moment';
import { formatClock, formatDoppler, formatLocal, formatNumber } from '../../domain/time/format';
import { chanceWords } from '../../domain/window/ledgerSheet';
import {
  QUALITY_NAMES,
  qualityFigure,
  qualityOfMargin,
  type Quality,
} from '../../domain/window/quality';
import type { ChosenStation } from '../../domain/window/searchData';
import type { FigureId } from '../../domain/window/figures';
import { FigureLabel } from '../ui/FigureLabel';
import { QualityChip } from '../ui/Quality';

interface Props {
  table: MoonTable;
  stations: ChosenStation[];
  cursorMs: number;
  frequencyMhz: number;
  /** Null while the Moon is not up for all and there is no margin. */
  quality: Quality | null;
  /** The link of two equipped stations at that very instant; null for others. */
  link: LinkMoment | null;
}

interface Row {
  figure: FigureId;
  name: string;
  unit: string;
  values: ReactNode[];
}

/** Figures at the hand, a column for each station; for many stations a row each. */
export function CursorTable({ table, stations, cursorMs, frequencyMhz, quality, link }: Props) {
  const samples = stations.map((station) => table.sample(station.site, cursorMs));
  const clock = (station: ChosenStation) =>
    station.timeZone === null ? '' : formatLocal(cursorMs, station.timeZone);
  const doppler = (rateMps: number, otherMps?: number) =>
    formatDoppler(dopplerHz(frequencyMhz, rateMps, otherMps), frequencyMhz).replace(/\s?Hz$/, '');
  const rows: Row[] = [
    {
      figure: 'azimuth',
      name: 'Azimuth',
      unit: '°',
      values: samples.map((at) => formatNumber(at.azimuthDeg, 1)),
    },
    {
      figure: 'elevation',
      name: 'Elevation',
      unit: '°',
      values: samples.map((at) => formatNumber(at.elevationDeg, 1)),
    },
    {
      figure: 'distance',
      name: 'Distance',
      unit: 'km',
      values: samples.map((at) => formatNumber(at.rangeKm)),
    },
    {
      figure: 'doppler',
      name: 'Own echo Doppler',
      unit: 'Hz',
      values: samples.map((at) => doppler(at.rangeRateMps)),
    },
  ];
  if (link?.moonUp) rows.push(...linkRows(link));
  const [first, second] = samples;
  return (
    <>
      {stations.length > 3 ? (
        <div
          className="table-scroll"
          role="region"
          aria-label="Figures at the hand"
          // Wider than a phone: it must be possible to scroll it by keys.
          // eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex
          tabIndex={0}
        >
          <table className="figures table">
            <thead>
              <tr>
                <th scope="col">At {formatClock(cursorMs)} UTC</th>
                {rows.map((row) => (
                  <th key={row.name} scope="col" className="figure">
                    <FigureLabel figure={row.figure}>{row.name}</FigureLabel>, {row.unit}
                  </th>
                ))}
              </tr>
            </thead>
            <tbody>
              {stations.map((station, index) => (
                <tr key={station.token}>
                  <th scope="row">
                    {station.callSign} <span className="label">{clock(station)}</span>
                  </th>
                  {rows.map((row) => (
                    <td key={row.name} className="figure">
                      {row.values[index]}
                    </td>
                  ))}
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      ) : (
        <table className="figures table">
          <thead>
            <tr>
              <th scope="col">At {formatClock(cursorMs)} UTC</th>
              {stations.map((station) => (
                <th key={station.token} scope="col" className="figure">
                  {station.callSign}
                  <br />
                  {clock(station)}
                </th>
              ))}
              <th>
                <span className="sr-only">Unit</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr key={row.name}>
                <th scope="row">
                  <FigureLabel figure={row.figure}>{row.name}</FigureLabel>
                </th>
                {row.values.map((value, index) => (
                  <td key={stations[index]!.token} className="figure">
                    {value}
                  </td>
                ))}
                <td className="figures__unit">{row.unit}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
      <p className="figures__between">
        {stations.length === 2 && first && second ? (
          <span>
            Between you: <FigureLabel figure="doppler">Doppler</FigureLabel>{' '}
            <strong>
              {formatDoppler(
                dopplerHz(frequencyMhz, first.rangeRateMps, second.rangeRateMps),
                frequencyMhz,
              )}
            </strong>
            , <FigureLabel figure="pathLoss">path loss</FigureLabel>{' '}
            <strong>
              {formatNumber(pathLossDb(frequencyMhz, first.rangeKm, second.rangeKm), 1)} dB
            </strong>
            .{link?.moonUp ? <LinkSentence link={link} /> : null}
          </span>
        ) : null}
        {quality && !link ? (
          <span className="figures__quality">
            <FigureLabel figure={quality.basis}>{QUALITY_NAMES[quality.basis]}</FigureLabel>{' '}
            <QualityChip quality={quality} />
          </span>
        ) : null}
      </p>
    </>
  );
}

/** What each station receives from the other. */
function linkRows({ directions }: LinkMoment): Row[] {
  const atEnds = [directions[1], directions[0]];
  return [
    {
      figure: 'systemNoise',
      name: 'System noise',
      unit: 'K',
      values: atEnds.map((direction) => formatNumber(direction.systemTemperatureK)),
    },
    {
      figure: 'margin',
      name: 'Heard at this end',
      unit: 'dB',
      values: atEnds.map((direction) => {
        const quality = qualityOfMargin(direction.marginDb);
        return (
          <>
            <strong>{qualityFigure(quality)}</strong> {quality.step}
          </>
        );
      }),
    },
  ];
}

function LinkSentence({ link }: { link: LinkMoment }) {
  const { mode, ways, slotMinutes } = link.model;
  return (
    <>
      {' '}
      {ways[0].meeting.kind === 'fixed' ? null : (
        <>
          <FigureLabel figure="polarization">Polarisation offset</FigureLabel>{' '}
          {formatNumber(link.polarizationOffsetDeg)}°.{' '}
        </>
      )}
      <FigureLabel figure="margin">Margin</FigureLabel> over {mode.label} at{' '}
      {formatNumber(mode.thresholdDb, 1)} dB in {REFERENCE_BANDWIDTH_HZ} Hz.{' '}
      <FigureLabel figure="chance">Chance of a contact</FigureLabel> in {slotMinutes} minutes{' '}
      {chanceWords(link.contactChance)}.
    </>
  );
}
