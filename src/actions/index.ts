import { activities } from './activities';
import { feeds } from './feeds';
import { people } from './people';
import { skeds } from './skeds';

/** Forms that work without JavaScript, by topic. */
export const server = { activities, feeds, people, skeds };
