import { feeds } from './feeds';
import { people } from './people';
import { skeds } from './skeds';

/** Forms that work without JavaScript, by topic. */
export const server = { feeds, people, skeds };
