import { describe, expect, it } from 'vitest';
import { changesOf, fieldWords, kindOf } from '@/components/history/changes';

describe('what an entry changed', () => {
  it('leaves out what is the same and puts a changed value before what is only set', () => {
    const changes = changesOf({
      before: { state: 'received', lotSize: 100, note: null },
      after: {
        analysisId: '3f2c1a90-1111-4222-8333-444455556666',
        lotSize: 100,
        reason: 'weighed again',
        state: 'under_inspection',
      },
    });
    expect(changes.map(({ field }) => field)).toEqual(['state', 'reason', 'analysisId']);
    expect(changes[0]).toEqual({ field: 'state', before: 'received', after: 'under_inspection' });
  });

  it('tells the kinds of values apart, so that ids are not read as words', () => {
    expect(kindOf('')).toBe('nothing');
    expect(kindOf(false)).toBe('flag');
    expect(kindOf('2026-12-01T16:38:54.000Z')).toBe('instant');
    expect(kindOf('3f2c1a90-1111-4222-8333-444455556666')).toBe('code');
    expect(kindOf({ a: 1 })).toBe('structure');
    expect(kindOf('16000000')).toBe('text');
  });

  it('says field names in words and keeps units', () => {
    expect(fieldWords('correctiveAction')).toBe('corrective action');
    expect(fieldWords('toleranceLowPpm')).toBe('tolerance low, ppm');
    expect(fieldWords('carrierHz')).toBe('carrier, Hz');
  });
});
