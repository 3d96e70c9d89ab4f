import type { ReactNode } from 'react';
import { Icon } from './Icon';

export interface Problem {
  /** Id of the field to jump to, where the problem has one. */
  fieldId?: string | undefined;
  message: string;
}

/** What is wrong with a form, at its top; each line leads to its field. Renders nothing without problems. */
export function ProblemSummary({ title, problems }: { title?: string; problems: Problem[] }) {
  if (problems.length === 0) return null;
  return (
    <div className="notice notice--problem" role="alert" tabIndex={-1}>
      <h2>{title ?? 'Nothing was saved yet'}</h2>
      <ul>
        {problems.map((problem) => (
          <li key={`${problem.fieldId ?? ''}${problem.message}`}>
            {problem.fieldId ? (
              <a href={`#${problem.fieldId}`}>{problem.message}</a>
            ) : (
              problem.message
            )}
          </li>
        ))}
      </ul>
    </div>
  );
}

/** A sentence about what just happened or what to know here. */
export function Notice({ children }: { children: ReactNode }) {
  return (
    <div className="notice" role="status">
      {children}
    </div>
  );
}

/** The usual cautions, wherever transmitting is spoken of. Not dismissable. */
export function Cautions({ lowestElevationDeg }: { lowestElevationDeg?: number | undefined }) {
  return (
    <aside className="cautions" aria-label="Cautions">
      <Icon name="triangleAlert" />
      <p>
        <strong>Before you transmit.</strong> Keep people out of the beam and away from the feed
        {lowestElevationDeg === undefined
          ? ', and the dish above its lowest elevation for transmitting'
          : `, and the dish above ${lowestElevationDeg.toFixed(1)}°`}
        . High-voltage and high-current supplies kill: discharge and lock out before you touch them.
        Check T/R changeover before power. Stow the dish in wind. Your national rules and your
        licence come first.
      </p>
    </aside>
  );
}

/** Why there is nothing here and what to do next. */
export function EmptyState({ title, children }: { title: string; children?: ReactNode }) {
  return (
    <div className="empty">
      <svg viewBox="0 0 110 40" aria-hidden="true" className="h-10 w-[110px]">
        <path d="M6 20C14 4 38 4 48 20Z" fill="var(--color-asleep)" stroke="var(--color-rule2)" />
        <path
          d="M62 20C72 36 96 36 104 20Z"
          fill="var(--color-asleep)"
          stroke="var(--color-rule2)"
        />
        <path d="M0 20H110" stroke="var(--color-rule2)" />
      </svg>
      <div>
        <p>
          <strong>{title}</strong>
        </p>
        {children}
      </div>
    </div>
  );
}
