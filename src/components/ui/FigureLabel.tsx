import type { ReactNode } from 'react';
import { FIGURE_ANCHORS, type FigureId } from '../../domain/window/figures';
import { paths } from '../../paths';

/** The name of a figure, leading to how it is computed. */
export function FigureLabel({ figure, children }: { figure: FigureId; children: ReactNode }) {
  return (
    <a className="figure-label" href={paths.methodPart(FIGURE_ANCHORS[figure])}>
      {children}
    </a>
  );
}
