import type { MoonPhase } from '../../domain/window/moonPhase';

/**
 * Outline of the lit part of a disc with its bright limb to the right while waxing (as seen from the north).
 */
export function litPath(phase: MoonPhase, x: number, y: number, r: number): string {
  const side = phase.waxing ? 1 : 0;
  const bulge = Math.abs(1 - 2 * phase.illuminated) * r;
  const gibbous = phase.illuminated > 0.5;
  const terminator = gibbous === phase.waxing ? 1 : 0;
  return `M${x} ${y - r}A${r} ${r} 0 0 ${side} ${x} ${y + r}A${bulge.toFixed(2)} ${r} 0 0 ${terminator} ${x} ${y - r}Z`;
}

/** The Moon's disc with its phase; dark and lit part by the classes of chart.css. */
export function MoonGlyph({
  phase,
  x,
  y,
  r,
}: {
  phase: MoonPhase;
  x: number;
  y: number;
  r: number;
}) {
  return (
    <g className="moon">
      <circle className="moon__dark" cx={x} cy={y} r={r} />
      <path className="moon__lit" d={litPath(phase, x, y, r)} />
      <circle className="moon__rim" cx={x} cy={y} r={r} />
    </g>
  );
}
