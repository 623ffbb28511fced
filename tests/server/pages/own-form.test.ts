import { describe, expect, it } from 'vitest';
import { isOwnForm, ownPath } from '../../../server/pages/own-form.ts';

describe('a form', () => {
  it.each([
    ['from a page of this service', { 'sec-fetch-site': 'same-origin' }, true],
    ['from another site', { 'sec-fetch-site': 'cross-site' }, false],
    ['from a neighbour under the same domain', { 'sec-fetch-site': 'same-site' }, false],
    ['of no page, typed by the user', { 'sec-fetch-site': 'none' }, false],
    ['of a browser on a plain local network', { origin: 'http://ledger:8080' }, true],
    ['of another port of the host', { origin: 'http://ledger:9090' }, false],
    ['that hides its origin', { origin: 'null' }, false],
    ['that says nothing', {}, false],
    [
      'whose origin fits but which came across sites',
      { origin: 'http://ledger:8080', 'sec-fetch-site': 'cross-site' },
      false,
    ],
  ])('%s', (_, headers, own) => {
    expect(isOwnForm({ headers: { host: 'ledger:8080', ...headers } })).toBe(own);
  });
});

describe('the page to go on to', () => {
  it.each(['/', '/sweeps/1?as=csv', '/antennas/field-20m'])('may be %s', (path) => {
    expect(ownPath(path)).toBe(path);
  });

  it.each([
    '//elsewhere.example',
    '/\\elsewhere.example',
    'https://elsewhere.example',
    '',
    '/a\nb',
  ])('is the board instead of %j', (path) => {
    expect(ownPath(path)).toBe('/');
  });
});
