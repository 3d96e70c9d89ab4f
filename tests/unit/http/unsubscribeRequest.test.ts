import { describe, expect, it } from 'vitest';
import { askedByMailLink } from '~/server/http/unsubscribeRequest';

const PUBLIC = 'https://echotide.example';
const ADDRESS = `${PUBLIC}/unsubscribe/x`;
const FORM = 'application/x-www-form-urlencoded';

function ask(body: string | FormData, headers: Record<string, string> = {}) {
  const request = new Request(ADDRESS, { method: 'POST', body, headers });
  return askedByMailLink(request, PUBLIC);
}

describe('askedByMailLink', () => {
  it.each(['GET', 'HEAD', 'OPTIONS'])('%s only looks', async (method) => {
    expect(await askedByMailLink(new Request(ADDRESS, { method }), PUBLIC)).toBeNull();
  });

  it('takes the one press in either encoding of forms, wherever it comes from', async () => {
    expect(await ask('List-Unsubscribe=One-Click', { 'content-type': FORM })).toBe('off');
    const form = new FormData();
    form.set('List-Unsubscribe', 'One-Click');
    expect(await ask(form)).toBe('off');
    const foreign = { 'content-type': FORM, origin: 'https://elsewhere.example' };
    expect(await ask('List-Unsubscribe=One-Click', foreign)).toBe('off');
  });

  it('switches on again from a page of ours only', async () => {
    expect(await ask('switch=on', { 'content-type': FORM, origin: PUBLIC })).toBe('on');
    await expect(ask('switch=on', { 'content-type': FORM })).rejects.toThrow('Nothing was changed');
    const foreign = { 'content-type': FORM, origin: 'https://elsewhere.example' };
    await expect(ask('switch=on', foreign)).rejects.toThrow('Nothing was changed');
  });

  it.each([
    ['', FORM],
    ['List-Unsubscribe=Maybe', FORM],
    ['{"List-Unsubscribe":"One-Click"}', 'application/json'],
    ['List-Unsubscribe=One-Click', 'text/plain'],
    ['rubbish', 'multipart/form-data; boundary=x'],
    [`${'x'.repeat(5000)}&List-Unsubscribe=One-Click`, FORM],
  ])('refuses %.40j as %s', async (body, type) => {
    await expect(ask(body, { 'content-type': type })).rejects.toThrow(
      /Nothing|Send|larger|not a form/,
    );
  });
});
