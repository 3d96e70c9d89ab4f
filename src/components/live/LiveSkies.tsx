import { lookAt, type LiveData } from '../../domain/sked/live';
import type { SkyLimits } from '../../domain/sky';
import { formatNumber } from '../../domain/time/format';
import { MINUTE_MS } from '../../domain/time/interval';
import type { MoonPhase } from '../../domain/window/moonPhase';
import { domeLine, domePoint, runsAboveHorizon } from '../chart/domeGeometry';
import { MoonGlyph } from '../chart/MoonGlyph';
import { DOME_RADIUS, SkyDome } from '../chart/SkyDome';

interface Props {
  data: LiveData;
  atMs: number;
  ownSky: SkyLimits;
  phase: MoonPhase;
}

/** Where the Moon stands in every sky, now and in ten minutes. */
export function LiveSkies({ data, atMs, ownSky, phase }: Props) {
  const skies = [...data.track.skies].sort(
    (a, b) => Number(b.callSign === data.own) - Number(a.callSign === data.own),
  );
  return (
    <section aria-label="The Moon">
      <table className="live__table table">
        <thead>
          <tr>
            <th scope="col">Moon at</th>
            <th scope="col" className="figure">
              Azimuth
            </th>
            <th scope="col" className="figure">
              Elevation
            </th>
            <th scope="col" className="figure">
              in 10 min
            </th>
          </tr>
        </thead>
        <tbody>
          {skies.map(({ callSign }) => {
            const now = lookAt(data, callSign, atMs);
            const later = lookAt(data, callSign, atMs + 10 * MINUTE_MS);
            const mine = callSign === data.own;
            return (
              <tr key={callSign} className={mine ? 'live__mine' : undefined}>
                <th scope="row">{mine ? 'You' : callSign}</th>
                <td className="figure">{now ? formatNumber(now.azimuthDeg, 1) : '–'}</td>
                <td className="figure">{now ? formatNumber(now.elevationDeg, 1) : '–'}</td>
                <td className="figure">
                  {later
                    ? `${formatNumber(later.azimuthDeg, 1)} / ${formatNumber(later.elevationDeg, 1)}`
                    : '–'}
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
      <div className="live__domes">
        {skies.map(({ callSign, azimuthsDeg, elevationsDeg }) => {
          const now = lookAt(data, callSign, atMs);
          const mine = callSign === data.own;
          const track = azimuthsDeg.map((azimuthDeg, index) => ({
            azimuthDeg,
            elevationDeg: elevationsDeg[index]!,
          }));
          const moon = now && domePoint(now.azimuthDeg, now.elevationDeg, DOME_RADIUS);
          return (
            <figure key={callSign}>
              <SkyDome sky={mine ? ownSky : {}} label={`Sky of ${callSign}`}>
                <g aria-hidden="true">
                  {runsAboveHorizon(track).map((run, index) => (
                    <path key={index} className="pass" d={domeLine(run, DOME_RADIUS)} />
                  ))}
                  {moon && now.elevationDeg > 0 ? (
                    <MoonGlyph phase={phase} x={moon.x} y={moon.y} r={11} />
                  ) : null}
                </g>
              </SkyDome>
              <figcaption className="label">{mine ? `${callSign}, you` : callSign}</figcaption>
            </figure>
          );
        })}
      </div>
    </section>
  );
}
