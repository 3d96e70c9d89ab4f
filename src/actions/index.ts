import { activities } from './activities';
import { people } from './people';
import { skeds } from './skeds';

/** Forms that work without JavaScript, by topic. */
export const server = { activities, people, skeds };
