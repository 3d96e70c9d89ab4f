import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { openDatabase, openSqlite } from '~/server/db/connection';
import { inTransaction } from '~/server/db/transaction';
import { startChild, typescript } from './children';
import { openGround, type Ground } from './ground';

let ground: Ground;
beforeEach(async () => {
  ground = await openGround();
});
afterEach(() => ground.end());

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));
const put = (name: string) => ({ name, value: '0' });
const names = async () =>
  (await ground.db.selectFrom('installation').select('name').execute()).map(({ name }) => name);

describe('inTransaction', () => {
  it('keeps everything or nothing', async () => {
    await inTransaction(ground.db, (tx) =>
      tx.insertInto('installation').values(put('a')).execute(),
    );
    const failing = inTransaction(ground.db, async (tx) => {
      await tx.insertInto('installation').values(put('b')).execute();
      throw new Error('no');
    });
    await expect(failing).rejects.toThrow('no');
    expect(await names()).toEqual(['a']);
  });

  it('refuses nesting, and leaves nothing behind', async () => {
    const nested = inTransaction(ground.db, async (tx) => {
      await tx.insertInto('installation').values(put('outer')).execute();
      await inTransaction(ground.db, () => Promise.resolve());
    });
    await expect(nested).rejects.toThrow(/inside a transaction/);
    expect(await names()).toEqual([]);
  });

  it('lets transactions of one process wait for each other', async () => {
    const order: string[] = [];
    const one = (name: string) =>
      inTransaction(ground.db, async (tx) => {
        order.push(`${name} begins`);
        await tx.insertInto('installation').values(put(name)).execute();
        await pause(20);
        order.push(`${name} ends`);
      });
    await Promise.all([one('a'), one('b')]);
    expect(order).toEqual(['a begins', 'a ends', 'b begins', 'b ends']);
  });

  it('takes the write lock before it reads', async () => {
    const other = openSqlite(ground.config.databaseFile);
    other.pragma('busy_timeout = 0');
    await inTransaction(ground.db, () => {
      expect(() => other.exec('BEGIN IMMEDIATE')).toThrow(/locked/);
      return Promise.resolve();
    });
    other.exec('BEGIN IMMEDIATE; ROLLBACK');
    other.close();
  });

  it('waits for the write lock of another without stopping its own process', async () => {
    const other = openSqlite(ground.config.databaseFile);
    other.exec('BEGIN IMMEDIATE');
    let turns = 0;
    const turning = setInterval(() => (turns += 1), 5);
    setTimeout(() => {
      other.exec('COMMIT');
      other.close();
    }, 200);
    await inTransaction(ground.db, (tx) =>
      tx.insertInto('installation').values(put('late')).execute(),
    );
    clearInterval(turning);
    expect(await names()).toEqual(['late']);
    expect(turns).toBeGreaterThan(5);
  });

  it('loses no update of two processes that read first and write later', async () => {
    await ground.db.insertInto('installation').values(put('counter')).execute();
    const rounds = 300;
    const file = 'tests/integration/platform/counterWorker.ts';
    const both = [1, 2].map(
      () => startChild(typescript(file, ground.config.databaseFile, String(rounds)), {}).ended,
    );
    expect((await Promise.all(both)).map(({ code }) => code)).toEqual([0, 0]);
    const counter = await ground.db.selectFrom('installation').selectAll().executeTakeFirst();
    expect(counter).toEqual({ name: 'counter', value: String(2 * rounds) });
  });
});

describe('openDatabase', () => {
  it('gives every connection the settings that must be shared', () => {
    const sqlite = openSqlite(ground.config.databaseFile);
    const setting = (name: string): unknown => sqlite.pragma(name, { simple: true });
    expect(setting('journal_mode')).toBe('wal');
    expect(setting('foreign_keys')).toBe(1);
    expect(setting('synchronous')).toBe(2);
    expect(setting('busy_timeout')).toBe(5000);
    sqlite.close();
  });
});

describe('a double booking', () => {
  it.each([
    ['the same hour', 1000, 2000, false],
    ['the first half', 500, 1500, false],
    ['inside', 1200, 1300, false],
    ['around', 0, 3000, false],
    ['one millisecond too long', 0, 1001, false],
    ['up to its start', 0, 1000, true],
    ['from its end on', 2000, 3000, true],
  ])('over %s (%i to %i ms) is allowed: %s', async (_name, startAt, endAt, allowed) => {
    await seedSkeds(['one', 'two']);
    await book(ground, 'one', 1000, 2000);
    const second = { ...ground, db: openDatabase(ground.config.databaseFile) };
    const booking = book(second, 'two', startAt, endAt);
    if (allowed) await expect(booking).resolves.toBeDefined();
    else await expect(booking).rejects.toThrow('doubleBooking');
    if (allowed) {
      const move = second.db
        .updateTable('booking')
        .set({ start_at: 1999, end_at: 2001 })
        .where('sked_id', '=', 'two');
      await expect(move.execute()).rejects.toThrow('doubleBooking');
    }
    await second.db.destroy();
  });
});

async function seedSkeds(ids: string[]): Promise<void> {
  const at = ground.now();
  await ground.db
    .insertInto('station')
    .values({
      id: 'station',
      call_sign: 'QA1LUN',
      name: 'Test',
      latitude_deg: 0,
      longitude_deg: 0,
      height_m: 0,
      locator: 'JJ00aa',
      public_locator_length: 4,
      time_zone: 'UTC',
      sky_json: '{}',
      hours_json: '{}',
      created_at: at,
      updated_at: at,
    })
    .execute();
  await ground.db
    .insertInto('sked')
    .values(
      ids.map((id) => ({
        id,
        uid: id,
        band: '1296' as never,
        frequency_mhz: 1296,
        mode: 'cw' as never,
        state: 'agreed' as const,
        offered_by: 'station',
        start_at: 0,
        end_at: 1,
        created_at: at,
        updated_at: at,
      })),
    )
    .execute();
}

function book({ db }: Pick<Ground, 'db'>, skedId: string, startAt: number, endAt: number) {
  const values = { station_id: 'station', sked_id: skedId, start_at: startAt, end_at: endAt };
  return db.insertInto('booking').values(values).execute();
}
