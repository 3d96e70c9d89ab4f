import type { ChainReport, NoiseShare } from '../../domain/link/chainReport';
import type { ReceiveStage } from '../../domain/station/setup';
import { formatNumber, formatSigned } from '../../domain/time/format';
import { useWidth } from '../window/useWidth';

interface Props {
  stages: ReceiveStage[];
  report: ChainReport;
}

interface Column {
  kind: 'sky' | 'ground' | ReceiveStage['kind'];
  name: string;
  detail: string;
  noise: NoiseShare;
}

/** Before the page knows how wide it is. */
const USUAL_WIDTH = 720;
const LEAST_COLUMN = 88;
const WIDEST_COLUMN = 128;
const ROW = 190;
const BASE = 96;
const BAR = 60;
const LINE = 124;

/** The chain from the sky to the receiver, with a bar for what each part adds; longer chains go on in a second row. */
export function ChainPicture({ stages, report }: Props) {
  const [attach, known] = useWidth<HTMLDivElement>();
  const width = known || USUAL_WIDTH;
  const columns = columnsOf(stages, report);
  const perRow = Math.max(1, Math.min(columns.length, Math.floor(width / LEAST_COLUMN)));
  const step = Math.min(WIDEST_COLUMN, width / perRow);
  const rows = Math.ceil(columns.length / perRow);
  const most = Math.max(...columns.map(({ noise }) => noise.kelvin));
  return (
    <div ref={attach} className="min-w-0">
      <svg
        viewBox={`0 0 ${width} ${rows * ROW}`}
        width={width}
        height={rows * ROW}
        className="chain block h-auto max-w-full"
        role="img"
        aria-label={label(columns, report)}
      >
        {columns.map((column, index) => (
          <g
            key={index}
            transform={`translate(${(index % perRow) * step} ${Math.floor(index / perRow) * ROW})`}
          >
            <Part
              {...column}
              width={step}
              height={(column.noise.kelvin / most) * BAR}
              first={index === 2}
              end={index === columns.length - 1}
            />
          </g>
        ))}
      </svg>
    </div>
  );
}

function Part({
  kind,
  name,
  detail,
  noise,
  width,
  height,
  first,
  end,
}: Column & { width: number; height: number; first: boolean; end: boolean }) {
  const middle = width / 2;
  const stage = kind === 'amplifier' || kind === 'loss';
  return (
    <>
      <title>{`${name}: ${formatNumber(noise.kelvin, 1)} K`}</title>
      <text className="chain__figure" x={middle} y={BASE - height - 22}>
        {formatNumber(noise.kelvin, 1)} K
      </text>
      <text className="chain__label" x={middle} y={BASE - height - 7}>
        {formatNumber(noise.share * 100)} %
      </text>
      <rect
        className={stage ? 'chain__bar' : 'chain__bar chain__bar--outside'}
        x={middle - 16}
        y={BASE - height}
        width={32}
        height={Math.max(height, 1)}
      />
      <path className="chain__base" d={`M0 ${BASE + 0.5}H${width}`} />
      {stage ? (
        <path
          className="chain__line"
          d={`M${first ? middle - 28 : 0} ${LINE}H${end ? middle + 28 : width}`}
        />
      ) : null}
      {first ? <circle className="chain__end" cx={middle - 28} cy={LINE} r={3} /> : null}
      {end ? <circle className="chain__end" cx={middle + 28} cy={LINE} r={3} /> : null}
      <path className="chain__sign" d={SIGNS[kind](middle)} />
      <text className="chain__name" x={middle} y={LINE + 29}>
        {short(name, width)}
      </text>
      <text className="chain__label" x={middle} y={LINE + 45}>
        {detail}
      </text>
    </>
  );
}

/** Amplifier a triangle, loss a resistor, sky a rising arc, ground hatched. */
const SIGNS: Record<Column['kind'], (x: number) => string> = {
  amplifier: (x) => `M${x - 12} ${LINE - 12}L${x + 13} ${LINE}L${x - 12} ${LINE + 12}Z`,
  loss: (x) =>
    `M${x - 15} ${LINE - 7}H${x + 15}V${LINE + 7}H${x - 15}ZM${x - 10} ${LINE}l3.3 -4l6.7 8l6.7 -8l3.3 4`,
  sky: (x) =>
    `M${x - 14} ${LINE + 7}A14 14 0 0 1 ${x + 14} ${LINE + 7}M${x - 7} ${LINE + 7}A7 7 0 0 1 ${x + 7} ${LINE + 7}`,
  ground: (x) =>
    `M${x - 14} ${LINE - 4}H${x + 14}M${x - 11} ${LINE - 4}l-5 9M${x - 2} ${LINE - 4}l-5 9M${x + 7} ${LINE - 4}l-5 9`,
};

function columnsOf(stages: ReceiveStage[], { sky, ground, stages: shares }: ChainReport): Column[] {
  return [
    { kind: 'sky', name: 'Cold sky, air', detail: 'at 30°', noise: sky },
    { kind: 'ground', name: 'Ground', detail: 'spillover', noise: ground },
    ...stages.map((stage, index): Column => {
      const gainDb = stage.kind === 'amplifier' ? stage.gainDb : -stage.lossDb;
      return {
        kind: stage.kind,
        name: stage.name?.trim() || `Stage ${index + 1}`,
        detail: `${formatSigned(gainDb, 1)} dB`,
        noise: shares[index]!,
      };
    }),
  ];
}

function short(name: string, width: number): string {
  const most = Math.floor(width / 7);
  return name.length > most ? `${name.slice(0, most - 1)}…` : name;
}

function label(columns: Column[], { systemK }: ChainReport): string {
  const parts = columns.map(({ name, noise }) => `${name} ${formatNumber(noise.kelvin, 1)} K`);
  return `The receive chain: ${parts.join(', ')}; together ${formatNumber(systemK, 1)} K.`;
}
