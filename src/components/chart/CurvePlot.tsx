import { useEffect, useRef, type PointerEvent } from 'react';
import uPlot from 'uplot';
import type { CurvePanel } from '../../domain/window/curvePanels';
import { plotData, plotOptions, type PlotFrame } from './curveOptions';
import { onThemeChange } from './curveStyle';

interface Props extends PlotFrame {
  timesMs: Float64Array;
  panel: CurvePanel;
  cursorMs: number;
  onCursor: (atMs: number) => void;
}

interface Drawn {
  plot: uPlot;
  hand: HTMLElement;
}

/** One panel of curves. The table beside it says the same, so it is hidden from screen readers. */
export function CurvePlot(props: Props) {
  const { timesMs, panel, shown, window, width, withHours, cursorMs, onCursor } = props;
  const host = useRef<HTMLDivElement>(null);
  const drawn = useRef<Drawn | null>(null);

  useEffect(() => {
    const element = host.current;
    if (!element) return;
    const options = plotOptions(element, panel, { shown, window, width, withHours });
    const plot = new uPlot(options, plotData(timesMs, panel), element);
    const hand = document.createElement('div');
    hand.className = 'curve__hand';
    plot.over.append(hand);
    drawn.current = { plot, hand };
    const quiet = onThemeChange(() => plot.redraw(false));
    return () => {
      quiet();
      plot.destroy();
      drawn.current = null;
    };
  }, [timesMs, panel, shown, window, width, withHours]);

  useEffect(() => {
    const { plot, hand } = drawn.current ?? {};
    if (!plot || !hand) return;
    // Scales are known only after uPlot has drawn, the plot's box at once.
    const share = (cursorMs - shown.startMs) / (shown.endMs - shown.startMs);
    hand.hidden = share < 0 || share > 1;
    hand.style.left = `${share * 100}%`;
  }, [cursorMs, timesMs, panel, shown, window, width, withHours]);

  const follow = (event: PointerEvent<HTMLDivElement>) => {
    const box = drawn.current?.plot.over.getBoundingClientRect();
    if (!box || box.width === 0) return;
    const share = Math.min(Math.max((event.clientX - box.left) / box.width, 0), 1);
    onCursor(shown.startMs + share * (shown.endMs - shown.startMs));
  };
  return (
    <div
      ref={host}
      className="curve__plot"
      aria-hidden="true"
      onPointerDown={(event) => {
        event.currentTarget.setPointerCapture(event.pointerId);
        follow(event);
      }}
      onPointerMove={(event) => {
        if (event.currentTarget.hasPointerCapture(event.pointerId)) follow(event);
      }}
    />
  );
}
