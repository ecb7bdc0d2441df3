import { expect, it } from 'vitest';
import { judge } from '../../../server/mail/transport';

const error = (fields: object) => Object.assign(new Error('x'), fields);

it.each<[string, object, boolean, string]>([
  ['a refused recipient (RFC 5321 5yz)', { command: 'RCPT TO', responseCode: 550 }, false, 'never'],
  ['refused content', { command: 'DATA', responseCode: 554 }, true, 'never'],
  ['grey-listing (4yz)', { command: 'RCPT TO', responseCode: 451 }, false, 'refused'],
  ['a full disk after the content', { command: 'DATA', responseCode: 452 }, true, 'refused'],
  [
    'wrong credentials, which somebody will mend',
    { command: 'AUTH PLAIN', responseCode: 535 },
    false,
    'refused',
  ],
  ['a greeting that refuses', { command: 'CONN', responseCode: 554 }, false, 'refused'],
  ['no connection', { command: 'CONN', code: 'ECONNREFUSED' }, false, 'refused'],
  [
    'silence after the content was asked for',
    { command: 'CONN', code: 'ETIMEDOUT' },
    true,
    'uncertain',
  ],
])('judges %s', (_, fields, contentAskedFor, expected) => {
  expect(judge(error(fields), contentAskedFor).kind).toBe(expected);
});

it('keeps the server’s words on one line', () => {
  expect(judge(error({ response: '550 no\r\nsuch mailbox' }), false).answer).toBe(
    '550 no such mailbox',
  );
});
