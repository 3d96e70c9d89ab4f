import { describe, expect, it } from 'vitest';
import { paths } from '~/paths';
import { isOwnHost, mayChange } from '~/server/http/origin';

const PUBLIC = 'https://echotide.example';
const LOCAL = 'http://127.0.0.1:4321';

describe('isOwnHost', () => {
  it.each([
    ['echotide.example', PUBLIC],
    ['ECHOTIDE.example', PUBLIC],
    ['echotide.example:443', PUBLIC],
    ['127.0.0.1:4321', LOCAL],
    ['localhost:4321', LOCAL],
    ['[::1]:4321', LOCAL],
  ])('%s is %s', (host, publicUrl) => {
    expect(isOwnHost(host, publicUrl)).toBe(true);
  });

  it.each([
    ['', PUBLIC],
    ['elsewhere.example', PUBLIC],
    ['echotide.example.elsewhere.example', PUBLIC],
    ['echotide.example:8080', PUBLIC],
    ['localhost', PUBLIC],
    ['127.0.0.1:4322', LOCAL],
    ['127.0.0.1', LOCAL],
    ['echotide.example:4321', LOCAL],
  ])('%s is not %s', (host, publicUrl) => {
    expect(isOwnHost(host, publicUrl)).toBe(false);
  });
});

const asks = (
  method: string,
  headers: Record<string, string>,
  pathname = '/account',
  search = '',
) => mayChange({ method, pathname, search, headers: new Headers(headers) }, PUBLIC);

describe('mayChange', () => {
  it.each(['GET', 'HEAD', 'OPTIONS'])('%s needs no origin', (method) => {
    expect(asks(method, { origin: 'https://elsewhere.example' })).toBe(true);
  });

  it.each(['POST', 'PUT', 'PATCH', 'DELETE', 'QUERY'])('%s needs our origin', (method) => {
    expect(asks(method, { origin: PUBLIC })).toBe(true);
    expect(asks(method, { origin: 'https://elsewhere.example' })).toBe(false);
    expect(asks(method, { origin: 'http://echotide.example' })).toBe(false);
    expect(asks(method, { origin: 'https://echotide.example:8443' })).toBe(false);
    expect(asks(method, { origin: 'null' })).toBe(false);
    expect(asks(method, {})).toBe(false);
  });

  it('takes the word of the browser when the origin is missing', () => {
    expect(asks('POST', { 'sec-fetch-site': 'same-origin' })).toBe(true);
    expect(asks('POST', { 'sec-fetch-site': 'same-site' })).toBe(false);
    expect(asks('POST', { 'sec-fetch-site': 'none' })).toBe(false);
    expect(
      asks('POST', { origin: 'https://elsewhere.example', 'sec-fetch-site': 'same-origin' }),
    ).toBe(false);
  });

  it('leaves the way in for mails to the secret it asks for', () => {
    expect(asks('POST', {}, paths.api.inboundMail)).toBe(true);
    expect(asks('POST', {}, `${paths.api.inboundMail}/x`)).toBe(false);
  });

  it('leaves the calculators open, and nothing beside them', () => {
    for (const open of [paths.api.moon, paths.api.windows, paths.api.link]) {
      expect(asks('POST', { origin: 'https://elsewhere.example' }, open)).toBe(true);
      expect(asks('POST', {}, `${open}/more`)).toBe(false);
    }
    expect(asks('POST', {}, paths.api.skeds)).toBe(false);
  });

  it('lets a mail program unsubscribe by POST, at exactly that address and with nothing beside it', () => {
    const address = paths.unsubscribe('person.reminder.mac');
    expect(asks('POST', {}, address)).toBe(true);
    expect(asks('POST', { origin: 'https://elsewhere.example' }, address)).toBe(true);
    for (const method of ['PUT', 'PATCH', 'DELETE', 'QUERY']) {
      expect(asks(method, {}, address)).toBe(false);
    }
    // A page takes the name of an action from its query.
    expect(asks('POST', {}, address, '?_action=people.signOutEverywhere')).toBe(false);
    expect(asks('POST', {}, address, '?')).toBe(false);
    for (const near of [
      `${address}/`,
      `${address}/more`,
      '/unsubscribe',
      '/unsubscribe/',
      '/unsubscribed/x',
      `/account${address}`,
      `/${address}`,
      `${address}\n/account`,
    ]) {
      expect(asks('POST', {}, near), near).toBe(false);
    }
  });
});

describe('pages whose address is a secret', () => {
  it('take the origin "null" of their own forms, and nobody else does', () => {
    for (const page of ['/answer/secret', '/answer/secret/move', '/roster/secret']) {
      expect(asks('POST', { origin: 'null' }, page)).toBe(true);
      expect(asks('POST', { origin: 'null', 'sec-fetch-site': 'same-origin' }, page)).toBe(true);
      expect(asks('POST', { origin: 'null', 'sec-fetch-site': 'cross-site' }, page)).toBe(false);
      expect(asks('POST', { origin: 'https://elsewhere.example' }, page)).toBe(false);
    }
    expect(asks('POST', { origin: 'null' })).toBe(false);
    expect(asks('POST', {}, '/answer/secret')).toBe(false);
    // What a cookie allows is not done there on nobody's word.
    for (const [action, taken] of [
      ['guests.accept', true],
      ['activities.answerByLink&station=x', true],
      ['guests.offer', false],
      ['people.signOutEverywhere', false],
      ['activities.publish', false],
    ] as const) {
      const query = `?_action=${action}`;
      expect(asks('POST', { origin: 'null' }, '/answer/secret', query), action).toBe(taken);
      expect(asks('POST', { origin: PUBLIC }, '/answer/secret', query), action).toBe(true);
    }
    expect(asks('POST', {}, '/no-more/token')).toBe(true);
    expect(asks('POST', {}, '/no-more/token', '?_action=people.signIn')).toBe(false);
  });
});
