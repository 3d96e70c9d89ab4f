import { activities } from './activities';
import { feeds } from './feeds';
import { guests } from './guests';
import { people } from './people';
import { skeds } from './skeds';

/** Forms that work without JavaScript, by topic. */
export const server = { activities, feeds, guests, people, skeds };
