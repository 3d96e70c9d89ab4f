import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { inTransaction } from '~/server/db/transaction';
import { enqueueMail } from '~/server/mail/outbox';
import { renderMail } from '~/server/mail/shell';
import { openGround, type Ground } from '../platform/ground';
import { ENTRY, letter, post, rowOf } from './letters';

let ground: Ground;
beforeEach(async () => {
  ground = await openGround();
});
afterEach(() => ground.end());

describe('enqueueMail', () => {
  it('keeps a mail under a Message-ID of its own at our host, due now', async () => {
    const row = await rowOf(ground, await post(ground));
    const other = await rowOf(ground, await post(ground));
    expect(row.message_id).toMatch(/^<[0-9a-f-]{36}@echotide\.example>$/);
    expect(other.message_id).not.toBe(row.message_id);
    expect(row).toMatchObject({ next_attempt_at: ground.now(), attempts: 0, sent_at: null });
  });

  it('sends nothing for a change that did not happen', async () => {
    const failing = inTransaction(ground.db, async (tx) => {
      await enqueueMail(tx, ground, letter());
      throw new Error('no');
    });
    await expect(failing).rejects.toThrow('no');
    expect(await ground.db.selectFrom('outbox').selectAll().execute()).toEqual([]);
  });

  it.each([
    'a@b.example\r\nBcc: c@d.example',
    'a@b.example, c@d.example',
    'a@b.example; c@d.example',
    'Name <a@b.example>',
    'a@b.example\u0000',
    'a b@c.example',
    '"x"@c.example',
    'nobody',
    '',
  ])('refuses %j as an address', async (to) => {
    await expect(post(ground, { to })).rejects.toThrow('one plain address');
  });

  it('keeps a subject on one line', async () => {
    const id = await post(ground, { subject: ' Hello\r\nBcc: c@d.example\u2028\u0007\tthere ' });
    expect((await rowOf(ground, id)).subject).toBe('Hello Bcc: c@d.example there');
  });

  it('refuses a calendar entry whose METHOD is not that of the mail', async () => {
    const mismatch = post(ground, { calendar: { method: 'CANCEL', body: ENTRY } });
    await expect(mismatch).rejects.toThrow('METHOD:REQUEST, the mail CANCEL');
    const none = post(ground, { calendar: { method: 'REQUEST', body: 'BEGIN:VCALENDAR' } });
    await expect(none).rejects.toThrow('METHOD:(none)');
  });
});

describe('renderMail', () => {
  const { html, text } = renderMail({
    title: 'Moved & kept',
    paragraphs: ['<script>alert("x")</script>', 'It’s on.'],
    facts: [
      ['Start', '21:00 UTC'],
      ['Local time', '22:00 Oslo'],
    ],
    button: { label: 'Open', url: 'https://echotide.example/?a=1&b="' },
    footer: 'Why you get this.',
  });

  it('escapes everything given', () => {
    expect(html).not.toContain('<script>');
    expect(html).toContain('&lt;script&gt;alert(&quot;x&quot;)&lt;/script&gt;');
    expect(html).toContain('href="https://echotide.example/?a=1&amp;b=&quot;"');
    expect(html).toContain('Moved &amp; kept');
  });

  it('says the same in plain text', () => {
    expect(text).toBe(
      [
        'Moved & kept',
        '<script>alert("x")</script>',
        'It’s on.',
        'Start:      21:00 UTC\nLocal time: 22:00 Oslo',
        'Open:\nhttps://echotide.example/?a=1&b="',
        '-- \nWhy you get this.\n',
      ].join('\n\n'),
    );
  });
});
