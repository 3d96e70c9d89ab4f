/** As it is stored. */
export type ActivityState = 'collecting' | 'planned' | 'published';
/** As it is told: an activity whose plan was published is over when its end has passed. */
export type ActivityStage = ActivityState | 'over';

/** The stage at an instant. Without a published plan an activity goes on collecting or being planned. */
export function stageOf(state: ActivityState, endMs: number, nowMs: number): ActivityStage {
  return state === 'published' && endMs <= nowMs ? 'over' : state;
}

export const STAGE_WORDS: Record<ActivityStage, string> = {
  collecting: 'collecting answers',
  planned: 'planned, not published',
  published: 'published',
  over: 'over',
};
