import { sql } from 'kysely';
import type { Role } from '../db/tables';
import type { Services } from '../services';

export interface ListedPerson {
  id: string;
  name: string;
  email: string;
  role: Role;
  stationCount: number;
  state: 'confirmed' | 'unconfirmed' | 'locked';
}

export interface PeoplePage {
  people: ListedPerson[];
  /** How many match in all. */
  total: number;
  /** Give this as `after` for the next page; undefined on the last one. */
  next: string | undefined;
}

const PAGE_SIZE = 50;

/** People whose name or address contains `search`, in order of address, from after the address `after`. */
export async function listPeople(
  { db }: Pick<Services, 'db'>,
  { search = '', after }: { search?: string; after?: string | undefined },
  pageSize = PAGE_SIZE,
): Promise<PeoplePage> {
  const pattern = `%${search.trim().replace(/[\\%_]/g, '\\$&')}%`;
  const matching = db
    .selectFrom('person')
    .where(sql<boolean>`(name LIKE ${pattern} ESCAPE '\\' OR email LIKE ${pattern} ESCAPE '\\')`);
  const { total } = await matching
    .select((build) => build.fn.countAll<number>().as('total'))
    .executeTakeFirstOrThrow();
  let page = matching
    .select(['id', 'name', 'email', 'role', 'confirmed_at', 'locked_at'])
    .select((build) =>
      build
        .selectFrom('station_crew')
        .whereRef('station_crew.person_id', '=', 'person.id')
        .select((inner) => inner.fn.countAll<number>().as('stations'))
        .as('stations'),
    )
    .orderBy('email')
    .limit(pageSize + 1);
  if (after !== undefined) page = page.where('email', '>', after);
  const rows = await page.execute();
  const shown = rows.slice(0, pageSize);
  return {
    total,
    people: shown.map(({ confirmed_at, locked_at, stations, ...person }) => ({
      ...person,
      stationCount: stations ?? 0,
      state: locked_at !== null ? 'locked' : confirmed_at === null ? 'unconfirmed' : 'confirmed',
    })),
    next: rows.length > pageSize ? shown.at(-1)?.email : undefined,
  };
}
