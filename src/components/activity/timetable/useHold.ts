import {
  useCallback,
  useEffect,
  useRef,
  useState,
  type KeyboardEvent,
  type PointerEvent,
} from 'react';
import type { TimetableSlot, TimetableView } from '../../../domain/activity/timetableView';
import { HOUR_MS } from '../../../domain/time/interval';
import { spanOf } from './geometry';
import { freePlaces, type Change } from './model';

/** A slot that is held, by pointer or keyboard: where it may go, and where it would go now. */
export interface Held {
  slot: TimetableSlot;
  /** Free starts on its band, in order. */
  starts: number[];
  /** Null: nowhere near the pointer. */
  targetMs: number | null;
  by: 'pointer' | 'keyboard';
}

const BEGIN_PX = 4;
/** A free start farther from the pointer than this does not catch the slot. */
const CATCH_MS = 1.5 * HOUR_MS;

export interface Hold {
  held: Held | null;
  lift: (event: PointerEvent<HTMLButtonElement>, slot: TimetableSlot) => void;
  onKey: (event: KeyboardEvent<HTMLButtonElement>, slot: TimetableSlot) => void;
  drop: () => void;
  putBack: () => void;
}

/** Lifting a slot and putting it down again: drag it, or Enter, arrows and Enter; Escape puts it back. */
export function useHold(
  view: TimetableView | undefined,
  change: (change: Change) => void,
  nowMs: () => number,
): Hold {
  const [held, setHeld] = useState<Held | null>(null);
  const heldNow = useRef<Held | null>(null);
  heldNow.current = held;
  const current = useRef({ view, change });
  current.current = { view, change };

  const startsOf = useCallback(
    (slot: TimetableSlot) =>
      current.current.view
        ? freePlaces(current.current.view, slot.wishId, nowMs())
            .filter(({ band }) => band === slot.band)
            .map(({ startMs }) => startMs)
        : [],
    [nowMs],
  );

  const drop = useCallback(() => {
    const now = heldNow.current;
    setHeld(null);
    if (!now || now.targetMs === null || now.targetMs === now.slot.startMs) return;
    const { wishId, band, pinned } = now.slot;
    current.current.change({ kind: 'place', wishId, band, startMs: now.targetMs, pinned });
  }, []);
  const putBack = useCallback(() => setHeld(null), []);

  const lift = useCallback(
    (event: PointerEvent<HTMLButtonElement>, slot: TimetableSlot) => {
      if (slot.begun || event.button !== 0) return;
      const element = event.currentTarget;
      const { pointerId, clientX: fromX } = event;
      const shown = current.current.view;
      if (!shown) return;
      const { hourPx } = spanOf(shown, shown.problem);
      // At once: a slot is so narrow that the pointer has left it before it was moved far enough.
      element.setPointerCapture(pointerId);
      let lifted = false;
      const move = (at: globalThis.PointerEvent) => {
        if (at.pointerId !== pointerId) return;
        const byPx = at.clientX - fromX;
        if (!lifted) {
          if (Math.abs(byPx) < BEGIN_PX) return;
          lifted = true;
          setHeld({ slot, starts: startsOf(slot), targetMs: slot.startMs, by: 'pointer' });
          return;
        }
        const wishedMs = slot.startMs + (byPx / hourPx) * HOUR_MS;
        setHeld((now) => {
          if (!now) return now;
          const targetMs = nearest(now.starts, wishedMs);
          return targetMs === now.targetMs ? now : { ...now, targetMs };
        });
      };
      const end = (at: globalThis.PointerEvent) => {
        if (at.pointerId !== pointerId) return;
        element.removeEventListener('pointermove', move);
        element.removeEventListener('pointerup', end);
        element.removeEventListener('pointercancel', end);
        if (!lifted) return;
        if (at.type === 'pointerup') drop();
        else putBack();
      };
      element.addEventListener('pointermove', move);
      element.addEventListener('pointerup', end);
      element.addEventListener('pointercancel', end);
    },
    [drop, putBack, startsOf],
  );

  const onKey = useCallback(
    (event: KeyboardEvent<HTMLButtonElement>, slot: TimetableSlot) => {
      const now = heldNow.current;
      if (now?.slot.wishId === slot.wishId) {
        const step = { ArrowLeft: -1, ArrowRight: 1 }[event.key];
        if (event.key === 'Enter' || event.key === ' ') drop();
        else if (step) setHeld({ ...now, targetMs: next(now, step) });
        else return;
      } else if (event.key === 'Enter' && !slot.begun) {
        setHeld({ slot, starts: startsOf(slot), targetMs: slot.startMs, by: 'keyboard' });
        return;
      } else return;
      event.preventDefault();
    },
    [drop, startsOf],
  );

  useEffect(() => {
    if (!held) return;
    const escape = (event: globalThis.KeyboardEvent) => {
      if (event.key === 'Escape') putBack();
    };
    window.addEventListener('keydown', escape);
    return () => window.removeEventListener('keydown', escape);
  }, [held, putBack]);

  return { held, lift, onKey, drop, putBack };
}

function nearest(starts: readonly number[], wishedMs: number): number | null {
  let best: number | null = null;
  for (const startMs of starts) {
    if (best === null || Math.abs(startMs - wishedMs) < Math.abs(best - wishedMs)) best = startMs;
  }
  return best !== null && Math.abs(best - wishedMs) <= CATCH_MS ? best : null;
}

function next({ starts, targetMs, slot }: Held, step: number): number | null {
  const from = targetMs ?? slot.startMs;
  const ordered = [...starts].sort((a, b) => a - b);
  const candidates =
    step > 0 ? ordered.filter((one) => one > from) : ordered.filter((one) => one < from);
  return (step > 0 ? candidates[0] : candidates.at(-1)) ?? targetMs;
}
