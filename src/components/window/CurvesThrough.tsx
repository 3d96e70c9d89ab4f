import { lazy, Suspense, useMemo, useState } from 'react';
import { bandById } from '../../domain/station/bands';
import type { Interval } from '../../domain/time/interval';
import { curvePanels } from '../../domain/window/curvePanels';
import { windowCurves } from '../../domain/window/curves';
import type { Answer } from './answer';
import { CurveTable } from './CurveTable';
import type { DetailView } from './detailView';

// The library that draws them is fetched when somebody wants to see them.
const CurvePanels = lazy(async () => ({
  default: (await import('../chart/CurvePanels')).CurvePanels,
}));

interface Props {
  answer: Answer;
  view: DetailView;
  window: Interval;
  width: number;
  cursorMs: number;
  onCursor: (atMs: number) => void;
}

/** Everything that changes through the window, drawn and in figures, folded away until asked for. */
export function CurvesThrough(props: Props) {
  const [open, setOpen] = useState(false);
  return (
    <details className="curves" onToggle={(event) => setOpen(event.currentTarget.open)}>
      <summary>Curves through the window</summary>
      {open ? <Curves {...props} /> : null}
    </details>
  );
}

function Curves({ answer, view, window, width, cursorMs, onCursor }: Props) {
  const { stations, layers, question } = answer;
  const frequencyMhz = bandById(question.band).centreMhz;
  const { links } = layers.judge;
  const link = links.length === 1 ? links[0]! : null;
  const { startMs, endMs } = window;
  const curves = useMemo(
    () =>
      windowCurves({
        table: view.table,
        span: view.shown,
        sites: stations.map(({ site }) => site),
        frequencyMhz,
        link,
      }),
    [view, stations, frequencyMhz, link],
  );
  const panels = useMemo(
    () =>
      curvePanels(
        curves,
        stations.map(({ callSign }) => callSign),
        frequencyMhz,
      ),
    [curves, stations, frequencyMhz],
  );
  const lit = useMemo(() => ({ startMs, endMs }), [startMs, endMs]);
  return (
    <div className="curves__body">
      <Suspense fallback={<p className="label">Drawing the curves.</p>}>
        <CurvePanels
          timesMs={curves.timesMs}
          panels={panels}
          shown={view.shown}
          window={lit}
          width={width}
          cursorMs={cursorMs}
          onCursor={onCursor}
        />
      </Suspense>
      <details>
        <summary>The same in figures, every 15 minutes</summary>
        <CurveTable timesMs={curves.timesMs} panels={panels} />
      </details>
    </div>
  );
}
