import { memo } from 'react';
import type { MoonTable } from '../../domain/ephemeris';
import type { TrackPoint } from '../../domain/ephemeris/samples';
import { HOUR_MS } from '../../domain/time/interval';
import type { MoonPhase } from '../../domain/window/moonPhase';
import type { QualityBand } from '../../domain/window/qualityBands';
import type { ChosenStation } from '../../domain/window/searchData';
import { compassWord } from './compass';
import { domeLine, domePoint, runsAboveHorizon } from './domeGeometry';
import { MoonGlyph } from './MoonGlyph';
import { DOME_RADIUS, SkyDome } from './SkyDome';

export interface DomePass {
  station: ChosenStation;
  pass: TrackPoint[];
}

interface Props {
  passes: DomePass[];
  /** The stations with the limits of the question. */
  looking: ChosenStation[];
  bands: QualityBand[];
  cursorMs: number;
  phase: MoonPhase;
  table: MoonTable;
  /** A line under each name, in the order of the passes. */
  notes?: string[] | undefined;
}

/** The skies of all stations side by side, one hand of the clock in all of them. */
export function MoonDomes({ passes, looking, bands, cursorMs, phase, table, notes }: Props) {
  return (
    <div className={passes.length > 2 ? 'domes domes--many' : 'domes'}>
      {passes.map(({ station, pass }, index) => {
        const { azimuthDeg, elevationDeg } = table.sample(station.site, cursorMs);
        const words =
          elevationDeg < 0 ? 'has the Moon below the horizon' : `looks ${compassWord(azimuthDeg)}`;
        return (
          <figure key={station.token} className="domes__one">
            <SkyDome
              sky={looking[index]!.sky}
              label={`Sky of ${station.callSign}: the Moon at azimuth ${azimuthDeg.toFixed(1)}°, elevation ${elevationDeg.toFixed(1)}°`}
            >
              <Pass pass={pass} bands={bands} />
              <Hand azimuthDeg={azimuthDeg} elevationDeg={elevationDeg} phase={phase} />
            </SkyDome>
            <figcaption>
              <strong>{station.callSign}</strong> {words}
              {notes?.[index] ? <span className="domes__note">{notes[index]}</span> : null}
            </figcaption>
          </figure>
        );
      })}
    </div>
  );
}

const Pass = memo(function Pass({ pass, bands }: { pass: TrackPoint[]; bands: QualityBand[] }) {
  const hours = hourMarks(pass);
  return (
    <g aria-hidden="true">
      {runsAboveHorizon(pass).map((run) => (
        <path key={run[0]!.timeMs} className="pass" d={domeLine(run, DOME_RADIUS)} />
      ))}
      {bands.map((band) => (
        <path
          key={band.startMs}
          className={`pass__band pass__band--${band.step}`}
          d={domeLine(within(pass, band.startMs, band.endMs), DOME_RADIUS)}
        />
      ))}
      <path className="pass__tick" d={hours.map((mark) => mark.tick).join('')} />
      {hours
        .filter((mark) => mark.hour % 2 === 0)
        .map((mark) => (
          <text
            key={mark.timeMs}
            className="pass__hour halo"
            x={mark.x}
            y={mark.y + 4}
            textAnchor="middle"
          >
            {String(mark.hour).padStart(2, '0')}
          </text>
        ))}
    </g>
  );
});

function Hand({
  azimuthDeg,
  elevationDeg,
  phase,
}: {
  azimuthDeg: number;
  elevationDeg: number;
  phase: MoonPhase;
}) {
  if (elevationDeg < 0) return null;
  const rim = domePoint(azimuthDeg, 0, DOME_RADIUS + 8);
  const moon = domePoint(azimuthDeg, elevationDeg, DOME_RADIUS);
  return (
    <g aria-hidden="true">
      <path className="hand" d={`M0 0L${rim.x.toFixed(1)} ${rim.y.toFixed(1)}`} />
      <circle className="hand__pin" r={2} />
      <MoonGlyph phase={phase} x={moon.x} y={moon.y} r={8} />
    </g>
  );
}

/** The part of a track between two instants, with its ends put in between the points. */
export function within(track: readonly TrackPoint[], startMs: number, endMs: number): TrackPoint[] {
  const inside = track.filter((point) => point.timeMs > startMs && point.timeMs < endMs);
  const ends = [startMs, endMs].map((atMs) => pointAt(track, atMs));
  return [ends[0] ?? null, ...inside, ends[1] ?? null].filter((point) => point !== null);
}

function pointAt(track: readonly TrackPoint[], atMs: number): TrackPoint | null {
  const index = track.findIndex((point) => point.timeMs >= atMs);
  const after = track[index];
  const before = track[index - 1];
  if (!after || !before) return after?.timeMs === atMs ? after : null;
  const share = (atMs - before.timeMs) / (after.timeMs - before.timeMs);
  let turn = after.azimuthDeg - before.azimuthDeg;
  if (turn > 180) turn -= 360;
  if (turn < -180) turn += 360;
  return {
    timeMs: atMs,
    azimuthDeg: before.azimuthDeg + share * turn,
    elevationDeg: before.elevationDeg + share * (after.elevationDeg - before.elevationDeg),
  };
}

interface HourMark {
  timeMs: number;
  hour: number;
  tick: string;
  /** Where the number goes: on the side of the zenith. */
  x: number;
  y: number;
}

/** A tick across the track each hour UTC. */
function hourMarks(pass: readonly TrackPoint[]): HourMark[] {
  const marks: HourMark[] = [];
  const first = pass[0];
  const last = pass.at(-1);
  if (!first || !last) return marks;
  for (let at = Math.ceil(first.timeMs / HOUR_MS) * HOUR_MS; at <= last.timeMs; at += HOUR_MS) {
    const here = pointAt(pass, at);
    const next = pointAt(pass, Math.min(at + HOUR_MS / 6, last.timeMs)) ?? last;
    if (!here || next.timeMs <= at) continue;
    const a = domePoint(here.azimuthDeg, here.elevationDeg, DOME_RADIUS);
    const b = domePoint(next.azimuthDeg, next.elevationDeg, DOME_RADIUS);
    const length = Math.hypot(b.x - a.x, b.y - a.y) || 1;
    const normal = { x: -(b.y - a.y) / length, y: (b.x - a.x) / length };
    const inward = normal.x * a.x + normal.y * a.y > 0 ? -1 : 1;
    marks.push({
      timeMs: at,
      hour: new Date(at).getUTCHours(),
      tick: `M${(a.x - 5 * normal.x).toFixed(1)} ${(a.y - 5 * normal.y).toFixed(1)}l${(10 * normal.x).toFixed(1)} ${(10 * normal.y).toFixed(1)}`,
      x: a.x + inward * normal.x * 15,
      y: a.y + inward * normal.y * 15,
    });
  }
  return marks;
}
