import { formatSigned } from '../../domain/time/format';
import type { Quality } from '../../domain/window/quality';

/** The figure on its shade; the word stands beside it unless the row says it elsewhere. */
export function QualityChip({ quality, word = true }: { quality: Quality; word?: boolean }) {
  return (
    <span className="inline-flex items-center gap-2">
      <span className={`chip chip--${quality.step}`}>{formatSigned(quality.db, 1)}</span>
      {word ? <span>{quality.step}</span> : null}
    </span>
  );
}
