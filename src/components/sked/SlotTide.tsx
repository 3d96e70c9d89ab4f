import type { SkedTide } from '../../domain/sked/sheet';
import type { Interval } from '../../domain/time/interval';
import { TwinTide } from '../chart/TwinTide';

interface Props {
  tide: SkedTide;
  width: number;
  time: Interval;
}

/** The slot in its twin tide as a still picture. Astro keeps the attribute name "slot" for itself, hence `time`. */
export function SlotTide({ tide, width, time }: Props) {
  return (
    <TwinTide
      {...tide}
      width={width}
      cursorMs={(time.startMs + time.endMs) / 2}
      slot={{ startMs: time.startMs, endMs: time.endMs }}
    />
  );
}
