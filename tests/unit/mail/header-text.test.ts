import { describe, expect, it } from 'vitest';
import { envelopeAddress, headerText, senderDomain } from '../../../server/mail/header-text';

describe('text for a header', () => {
  it.each([
    ['one\r\ntwo', 'one two'],
    ['a\u0000b\u0007c', 'a b c'],
    ['a\u2028b\u2029c\u0085d', 'a b c d'],
    ['\u202Eright to left', 'right to left'],
    ['  many   spaces ', 'many spaces'],
    ['ünïcode −3 ppm', 'ünïcode −3 ppm'],
  ])('turns %j into %j', (given, expected) => {
    expect(headerText(given)).toBe(expected);
  });
  it('is cut to a length every server takes', () => {
    expect(headerText('x'.repeat(1000))).toHaveLength(150);
  });
});

describe('an envelope address', () => {
  it.each(['a@example.com', 'first.last+tag@sub.example.com'])('is %s', (address) => {
    expect(envelopeAddress(address)).toBe(address);
  });
  it.each([
    'a@example.com, b@example.com',
    'a@example.com\r\nRCPT TO:<b@example.com>',
    'A <a@example.com>',
    'a@example.com>',
    'a@@example.com',
    'a(comment)@example.com',
    '',
    'a@exa\u202Emple.com',
  ])('is not %j', (address) => {
    expect(() => envelopeAddress(address)).toThrow('not a single e-mail address');
  });
});

it('takes the domain of Message-IDs from the sender', () => {
  expect(senderDomain('Quartzhold <no-reply@Example.COM>')).toBe('example.com');
  expect(senderDomain('no-reply@example.com')).toBe('example.com');
});
