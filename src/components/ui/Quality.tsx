import { QUALITY_NAMES, qualityFigure, type Quality } from '../../domain/window/quality';

/** The figure on its shade; the word stands beside it unless the row says it elsewhere. */
export function QualityChip({
  quality,
  word = true,
  named = false,
}: {
  quality: Quality;
  word?: boolean;
  /** Says whether it is a margin or a degradation, where both stand in one list. */
  named?: boolean;
}) {
  return (
    <span className="inline-flex items-center gap-2">
      <span className={`chip chip--${quality.step}`}>{qualityFigure(quality)}</span>
      {word ? (
        <span>
          {quality.step}
          {named ? (
            <span className="quiet"> {QUALITY_NAMES[quality.basis].toLowerCase()}</span>
          ) : null}
        </span>
      ) : null}
    </span>
  );
}
