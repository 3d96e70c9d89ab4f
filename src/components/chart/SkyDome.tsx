import { useId, type ReactNode, type Ref, type SVGAttributes } from 'react';
import type { SkyLimits } from '../../domain/sky';
import { domeRadius, domeXy, horizonPath, patchPath, unreachablePaths } from './domeGeometry';
import { Hatches } from './Hatches';

/** Radius of the rim in units of the drawing; overlays use it with domeGeometry. */
export const DOME_RADIUS = 118;
const MARGIN = 22;
const HALF = DOME_RADIUS + MARGIN;

const COMPASS = [
  { letter: 'N', x: 0, y: -HALF + 11, anchor: 'middle' },
  { letter: 'E', x: DOME_RADIUS + 9, y: 4.5, anchor: 'start' },
  { letter: 'S', x: 0, y: HALF - 2, anchor: 'middle' },
  { letter: 'W', x: -DOME_RADIUS - 9, y: 4.5, anchor: 'end' },
] as const;

interface Props {
  sky: SkyLimits;
  /** What the picture shows, for those who cannot see it. */
  label: string;
  /** Overlays in units of the drawing, zenith at 0, 0, rim at `DOME_RADIUS`: tracks, hand, Moon, handles. */
  children?: ReactNode;
  /** Under the outline but over the ground, such as a horizon not yet taken. */
  underlay?: ReactNode;
  ref?: Ref<SVGSVGElement>;
  className?: string | undefined;
  /** Handlers of the drawing as a whole, for editors. */
  svg?: SVGAttributes<SVGSVGElement> | undefined;
  /** Blocked sectors drawn by the caller itself. */
  withoutSectors?: boolean;
}

/**
 * The sky of one station: north up, east right, zenith in the middle, equal steps of elevation. Rings at
 * 30° and 60°, a dotted ring at the lowest elevation, a broken one at the lowest for transmitting where
 * it is higher, hatches for what is blocked, the horizon profile as rim.
 */
export function SkyDome({
  sky,
  label,
  children,
  underlay,
  ref,
  className,
  svg,
  withoutSectors = false,
}: Props) {
  const prefix = `dome${useId().replaceAll(/[^a-zA-Z0-9]/g, '')}`;
  const blockedFill = `url(#${prefix}-hz)`;
  const horizon = horizonPath(sky, DOME_RADIUS);
  const { elevationFromDeg: lowest = 0, transmitElevationFromDeg: transmit } = sky;
  return (
    <svg
      {...svg}
      ref={ref}
      className={['chart dome', className ?? ''].join(' ').trim()}
      viewBox={`${-HALF} ${-HALF} ${2 * HALF} ${2 * HALF}`}
      role={children ? 'group' : 'img'}
      aria-label={label}
    >
      <Hatches prefix={prefix} />
      <circle className="dome__ground" r={DOME_RADIUS} />
      <path
        className="dome__cross"
        d={`M${-DOME_RADIUS} 0H${DOME_RADIUS}M0 ${-DOME_RADIUS}V${DOME_RADIUS}`}
      />
      {[30, 60].map((elevationDeg) => (
        <circle
          key={elevationDeg}
          className="dome__ring"
          r={domeRadius(elevationDeg, DOME_RADIUS)}
        />
      ))}
      {horizon ? <path className="dome__horizon" fillRule="evenodd" d={horizon} /> : null}
      {unreachablePaths(sky, DOME_RADIUS).map((path) => (
        <path key={path} className="dome__blocked" fill={blockedFill} fillRule="evenodd" d={path} />
      ))}
      {withoutSectors
        ? null
        : sky.blocked?.map((sector, index) => (
            <path
              key={index}
              className="dome__blocked"
              fill={blockedFill}
              fillRule="evenodd"
              d={patchPath(sector, DOME_RADIUS)}
            />
          ))}
      {underlay}
      {lowest > 0 ? <circle className="dome__lowest" r={domeRadius(lowest, DOME_RADIUS)} /> : null}
      {transmit !== undefined && transmit > lowest ? (
        <circle className="dome__transmit" r={domeRadius(transmit, DOME_RADIUS)} />
      ) : null}
      <circle className="dome__rim" r={DOME_RADIUS} />
      <path className="dome__tick" d={rimTicks()} />
      {[30, 60].map((elevationDeg) => (
        <text
          key={elevationDeg}
          className="dome__label"
          x={3}
          y={-domeRadius(elevationDeg, DOME_RADIUS) + 12}
          aria-hidden="true"
        >
          {elevationDeg}°
        </text>
      ))}
      {COMPASS.map(({ letter, x, y, anchor }) => (
        <text
          key={letter}
          className="chart__strong"
          x={x}
          y={y}
          textAnchor={anchor}
          aria-hidden="true"
        >
          {letter}
        </text>
      ))}
      {children}
    </svg>
  );
}

/** A tick outside the rim each 30° of azimuth, a longer one at the four quarters. */
function rimTicks(): string {
  return Array.from({ length: 12 }, (_, index) => {
    const azimuthDeg = index * 30;
    const end = DOME_RADIUS + (azimuthDeg % 90 === 0 ? 6 : 4);
    return `M${domeXy(azimuthDeg, 0, DOME_RADIUS)}L${domeXy(azimuthDeg, 0, end)}`;
  }).join('');
}
