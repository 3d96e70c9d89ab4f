import type { WindowLayers } from '../../domain/window/layers';
import type { WindowQuestion } from '../../domain/window/question';
import type { ChosenStation, TakenSlot } from '../../domain/window/searchData';
import type { LimitDegrees } from '../../domain/window/sentences';

/** One question with its answer: what belongs together when it is shown. */
export interface Answer {
  question: WindowQuestion;
  stations: ChosenStation[];
  taken: TakenSlot[];
  layers: WindowLayers;
  degreesOf: LimitDegrees;
}
