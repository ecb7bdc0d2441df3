import { expect, it } from 'vitest';
import { refusalOf } from '@/components/holds/evidence-files';
import { warningMs } from '@/composables/useSessionEnd';
import { byteText } from '@shared/format/bytes';
import { waitingParts } from '@shared/format/durations';

const plain = (text: string) => text.replaceAll('\u00a0', ' ');

it('refuses evidence that the server would refuse, and names the file', () => {
  expect(refusalOf([{ name: 'report.PDF', size: 2000 }])).toBeNull();
  expect(refusalOf([{ name: 'macro.xlsm', size: 10 }])).toEqual({
    key: 'wrongType',
    name: 'macro.xlsm',
  });
  expect(refusalOf([{ name: 'a.csv', size: 0 }])?.key).toBe('isEmpty');
  expect(refusalOf([{ name: 'a.csv', size: 10 * 1024 * 1024 + 1 }])?.key).toBe('tooLarge');
  expect(refusalOf(Array.from({ length: 6 }, () => ({ name: 'a.csv', size: 1 })))?.key).toBe(
    'tooMany',
  );
});

it('writes sizes and waits short', () => {
  expect(byteText(999).replaceAll('\u00a0', ' ')).toBe('999 B');
  expect(plain(byteText(1500))).toBe('1.5 kB');
  expect(plain(byteText(999_999))).toBe('1 MB');
  expect(waitingParts(30)).toEqual({ number: '1', unit: 'min' });
  expect(waitingParts(5 * 3600 + 100)).toEqual({ number: '5', unit: 'h' });
  expect(waitingParts(4 * 86_400)).toEqual({ number: '4', unit: 'd' });
});

it('warns of the end of a session at least 20 s before, whatever its length', () => {
  expect(warningMs(60 * 60_000)).toBe(120_000);
  expect(warningMs(3 * 60_000)).toBe(60_000);
  expect(warningMs(10_000)).toBeGreaterThanOrEqual(20_000);
});
