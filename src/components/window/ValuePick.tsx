import { useEffect, useId, useRef, useState, type ReactNode } from 'react';
import { Icon } from '../ui/Icon';

interface ValuePickProps {
  /** What the value is, said before it to screen readers: "Lowest elevation at QA1LUN". */
  label: string;
  value: ReactNode;
  /** Quiet words after the value. */
  beside?: ReactNode;
  plain?: boolean;
  children: (close: () => void) => ReactNode;
}

/** Widest a panel gets, with its margin; near the right edge it opens to the left. */
const PANEL_WIDTH = 372;

/** A value of the sentence that opens a panel beneath it. The page stays usable while the panel is open. */
export function ValuePick({ label, value, beside, plain = false, children }: ValuePickProps) {
  const [open, setOpen] = useState(false);
  const [toLeft, setToLeft] = useState(false);
  const root = useRef<HTMLSpanElement>(null);
  const button = useRef<HTMLButtonElement>(null);
  const panelId = useId();
  const close = () => {
    setOpen(false);
    button.current?.focus();
  };
  useEffect(() => {
    if (!open) return;
    const outside = (event: PointerEvent) => {
      if (!root.current?.contains(event.target as Node)) setOpen(false);
    };
    const escape = (event: KeyboardEvent) => {
      if (event.key !== 'Escape') return;
      setOpen(false);
      button.current?.focus();
    };
    document.addEventListener('pointerdown', outside);
    document.addEventListener('keydown', escape);
    return () => {
      document.removeEventListener('pointerdown', outside);
      document.removeEventListener('keydown', escape);
    };
  }, [open]);
  return (
    <span ref={root} className="pick">
      <button
        ref={button}
        type="button"
        className={plain ? 'pick__plain' : 'pick__value'}
        aria-expanded={open}
        aria-controls={open ? panelId : undefined}
        onClick={(event) => {
          const { left } = event.currentTarget.getBoundingClientRect();
          setToLeft(left + PANEL_WIDTH > document.documentElement.clientWidth);
          setOpen(!open);
        }}
      >
        {plain ? <Icon name="plus" /> : <span className="sr-only">{label}: </span>}
        <span>{value}</span>
        {beside ? <span className="pick__beside">{beside}</span> : null}
      </button>
      {open ? (
        <div
          id={panelId}
          className={toLeft ? 'pick__panel pick__panel--left' : 'pick__panel'}
          role="group"
          aria-label={label}
        >
          {children(close)}
        </div>
      ) : null}
    </span>
  );
}

interface PickSelectProps {
  label: string;
  value: string;
  options: { value: string; label: string }[];
  onChange: (value: string) => void;
}

/** A value of the sentence chosen from the browser's own list. */
export function PickSelect({ label, value, options, onChange }: PickSelectProps) {
  return (
    <select
      className="pick__value pick__select"
      aria-label={label}
      value={value}
      onChange={(event) => onChange(event.target.value)}
    >
      {options.map((option) => (
        <option key={option.value} value={option.value}>
          {option.label}
        </option>
      ))}
    </select>
  );
}
