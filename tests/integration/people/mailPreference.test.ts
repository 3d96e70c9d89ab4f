import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { DEFAULT_MAIL_PREFERENCE } from '~/domain/people/mailPreference';
import { readUnsubscribeToken, unsubscribeToken, unsubscribeUrl } from '~/server/mail/unsubscribe';
import { mailPreferenceOf } from '~/server/people/mailPreferences';
import { saveMailPreference, switchTopic } from '~/server/people/saveMailPreference';
import { newWorld, type World } from '../skeds/world';

let world: World;
beforeEach(async () => {
  world = await newWorld();
});
afterEach(() => world.close());

describe('preferences', () => {
  it('are the defaults until somebody changes them, and then what was chosen', async () => {
    const { db } = world.services;
    const ylva = world.people['QA1LUN']!;
    expect(await mailPreferenceOf(db, ylva.id)).toEqual({ ...DEFAULT_MAIL_PREFERENCE, sinceMs: 0 });
    const wish = { ...DEFAULT_MAIL_PREFERENCE, reminderMinutes: [15] };
    await saveMailPreference(world.services, ylva, wish);
    expect(await mailPreferenceOf(db, ylva.id)).toEqual({ ...wish, sinceMs: world.clock.nowMs });
    await switchTopic(world.services, ylva.id, 'talk', false);
    const held = await mailPreferenceOf(db, ylva.id);
    expect(held.topics).toEqual({ ...wish.topics, talk: false });
    expect(held.reminderMinutes).toEqual([15]);
  });

  it('of nobody cannot be switched', async () => {
    expect(await switchTopic(world.services, 'nobody', 'talk', false)).toBe(false);
  });
});

describe('the unsubscribe token', () => {
  const what = { personId: 'person-ylva', topic: 'reminder' } as const;

  it('says whom and what, and is good for nothing else', () => {
    const { config } = world.services;
    const token = unsubscribeToken(config, what);
    expect(unsubscribeUrl(config, what)).toBe(`http://127.0.0.1:4999/unsubscribe/${token}`);
    expect(readUnsubscribeToken(config, token)).toEqual(what);
    for (const forged of [
      token.replace('reminder', 'digest'),
      token.replace('ylva', 'edda'),
      token.slice(0, -1),
      `${token}x`,
      `${token}.x`,
      token.replace(/[^.]+$/, ''),
      'person-ylva.account.x',
      '',
    ]) {
      expect(readUnsubscribeToken(config, forged), forged).toBeNull();
    }
  });

  it('is of this installation only', () => {
    const other = mkdtempSync(path.join(tmpdir(), 'echotide-other-'));
    const token = unsubscribeToken({ dataDir: other }, what);
    expect(readUnsubscribeToken(world.services.config, token)).toBeNull();
    rmSync(other, { recursive: true });
  });
});
