import os from 'node:os';
import { chromium, type CDPSession, type Page } from 'playwright';
import { ensureBuilt } from '../../src/cli/lib/build.mjs';
import { startServer } from '../e2e/support/server';
import { median, type Bench, type BenchResult } from './results';

const STEPS = 40;
const WARM_UP = 20;
/** Of the thumb, whose middle stays so far from the ends of the track. */
const THUMB_PX = 16;
export const BROWSER = {
  executablePath: process.env['CHROMIUM'] ?? '/usr/bin/chromium',
  args: [
    '--no-sandbox',
    '--disable-gpu',
    '--disable-quic',
    '--no-first-run',
    '--disable-background-networking',
    '--disable-component-update',
    '--disable-sync',
  ],
};

/** One step of the drag, from the browser's own clock. */
interface Frame {
  /** From the input's time stamp to the first task after the picture was handed over. */
  frameMs: number;
  /** From the first handler of the input until the page has computed and changed its elements. */
  scriptMs: number;
  /** Outline of all windows in that picture. */
  windows: string;
}

type Watched = Window & typeof globalThis & { dragFrames?: Frame[] };

async function run(): Promise<BenchResult[]> {
  await ensureBuilt();
  const server = await startServer({ demo: true });
  const browser = await chromium.launch(BROWSER);
  try {
    const page = await browser.newPage({ viewport: { width: 1440, height: 900 }, locale: 'en-GB' });
    const query = 'station=QA1LUN&station=QB7TID&days=60&counting=any';
    await page.goto(`${server.url}/windows?${query}`);
    await page.getByRole('button', { name: /^Lowest elevation at QA1LUN/ }).click();
    await drag(page, WARM_UP);
    const cdp = await page.context().newCDPSession(page);
    await cdp.send('Performance.enable');
    const before = await taskMs(cdp);
    const frames = await drag(page, STEPS);
    const after = await taskMs(cdp);
    return results(frames, (after - before) / STEPS);
  } finally {
    await browser.close();
    await server.stop();
  }
}

/** Main-thread time so far, drawing and what is put off included. */
async function taskMs(cdp: CDPSession): Promise<number> {
  const { metrics } = await cdp.send('Performance.getMetrics');
  return 1000 * metrics.find(({ name }) => name === 'TaskDuration')!.value;
}

/**
 * Presses the slider's thumb at its lower end and moves it up by whole degrees and half of the steps back down, each
 * move after the picture of the one before.
 */
async function drag(page: Page, steps: number): Promise<Frame[]> {
  const slider = page.getByRole('slider', { name: 'Lowest elevation at QA1LUN', exact: true });
  const least = Number(await slider.getAttribute('min'));
  const most = Number(await slider.getAttribute('max'));
  await slider.fill(String(least));
  await page.waitForTimeout(500);
  const box = (await slider.boundingBox())!;
  const perDeg = (box.width - THUMB_PX) / (most - least);
  const y = box.y + box.height / 2;
  const moveTo = (degrees: number) => page.mouse.move(box.x + THUMB_PX / 2 + degrees * perDeg, y);
  await moveTo(0);
  await page.mouse.down();
  await page.evaluate(watch);
  for (let step = 1; step <= steps; step += 1) {
    await moveTo(Math.min(step, steps - step));
    const drawn = await page.evaluate(pictures, step);
    if (drawn < step) throw new Error(`Step ${step} of the drag led to no picture.`);
  }
  await page.mouse.up();
  return page.evaluate(() => (window as Watched).dragFrames ?? []);
}

/** Runs in the page: waits until there are so many pictures, 5 s at most, and returns how many there are. */
async function pictures(wanted: number): Promise<number> {
  const { dragFrames: frames = [] } = window as Watched;
  for (let wait = 0; wait < 1000 && frames.length < wanted; wait += 1) {
    await new Promise((resolve) => setTimeout(resolve, 5));
  }
  return frames.length;
}

/** Runs in the page: notes every input of the slider and the picture it leads to. */
function watch(): void {
  const watched = window as Watched;
  const started = watched.dragFrames !== undefined;
  watched.dragFrames = [];
  if (started) return;
  // Handed over as it is: a name for it would be given by a helper that the page lacks.
  window.addEventListener(
    'input',
    (event) => {
      const startMs = performance.now();
      let scriptMs = 0;
      const done = new MessageChannel();
      done.port1.onmessage = () => (scriptMs = performance.now() - startMs);
      done.port2.postMessage(null);
      requestAnimationFrame(() => {
        const drawn = new MessageChannel();
        drawn.port1.onmessage = () => {
          const frameMs = performance.now() - event.timeStamp;
          const windows = document.querySelector('.raster .band__edge')?.getAttribute('d') ?? '';
          watched.dragFrames?.push({ frameMs, scriptMs, windows });
        };
        drawn.port2.postMessage(null);
      });
    },
    { capture: true },
  );
}

function results(frames: readonly Frame[], taskMs: number): BenchResult[] {
  const months = new Set(frames.map(({ windows }) => windows)).size;
  if (months < STEPS / 2) throw new Error(`The steps made only ${months} different months.`);
  const times = frames.map(({ frameMs }) => frameMs);
  const scripts = frames.map(({ scriptMs }) => scriptMs);
  const load = os.loadavg()[0]!.toFixed(1);
  const how = `lowest elevation dragged by ${STEPS} steps of 1°, up and down, over 60 days at 1440 px, headless Chromium; load ${load} on ${os.cpus().length} cores`;
  return [
    {
      name: 'drag.60days.worstFrameMs',
      value: Math.max(...times),
      unit: 'ms',
      note: `input to picture, the slowest step; ${how}`,
    },
    {
      name: 'drag.60days.medianFrameMs',
      value: median(times),
      unit: 'ms',
      note: 'the same steps, waiting for the next animation frame included',
    },
    {
      name: 'drag.60days.scriptMs',
      value: median(scripts),
      unit: 'ms',
      note: `script between input and picture, median; most ${Math.max(...scripts).toFixed(1)} ms; ${taskMs.toFixed(1)} ms of main thread a step with drawing and the table that follows`,
    },
  ];
}

export const drag60days: Bench = { name: 'drag.60days', run };
