import { describe, expect, it } from 'vitest';
import { METHOD_VERSION } from '@shared/analysis/analyse-lot';
import { AnalysisResult } from '@shared/contract/analysis';
import { canonicalJson, sha256Hex } from '../../../server/history/canonical';
import { analysisFixture, criteriaOf } from '../../support/lot-fixture';

/*
 * Results of a fixed lot, by method version. Signed decisions rest on results, so a change of any figure has to be seen:
 * when the test below fails and the change is meant, raise METHOD_VERSION in shared/analysis/analyse-lot.ts by one and add
 * the new version with the hash that the test prints. Leave the earlier lines: they say what earlier analyses were made by.
 * When the change is not meant, there is a mistake to find.
 */
const PINNED: Record<string, string> = {
  '1': 'e8a787bd1bd3cd18968263677dfcadff2173d678f13eb1c2df4d3aee6833435f',
};

/** A last digit may differ from engine to engine; twelve must not. */
const rounded = (_name: string, value: unknown) =>
  typeof value === 'number' ? Number(value.toPrecision(12)) : value;

const id = (n: number) => `00000000-0000-4000-8000-00000000000${n}`;

function fixedResult() {
  const criteria = criteriaOf(3000);
  const [first, second] = criteria.receivers;
  const { analysis } = analysisFixture({
    units: 240,
    withTemperature: true,
    withTime: true,
    beyondPpm: [-12.9, 10, 11, 11.6, 31],
    criteria: {
      part: { ...criteria.part, id: 'part', revisionId: 'part-C' },
      receivers: [
        { ...first!, receiverId: id(1), revisionId: id(2) },
        { ...second!, receiverId: id(3), revisionId: id(4) },
      ],
    },
  });
  // The members of an analysis that stand for the record, not for the result, are new in every run.
  const result = AnalysisResult.parse(analysis);
  return {
    ...result,
    unitsBeyond: result.unitsBeyond.map((unit) => ({ ...unit, uploadId: '' })),
  };
}

describe('the method version', () => {
  it('stands for exactly these results', () => {
    const hash = sha256Hex(canonicalJson(JSON.parse(JSON.stringify(fixedResult(), rounded))));
    expect(
      { version: METHOD_VERSION, hash },
      'Results of a fixed lot changed: if that is meant, raise METHOD_VERSION and pin the new hash; see the head of this test.',
    ).toEqual({ version: METHOD_VERSION, hash: PINNED[METHOD_VERSION] });
  });

  it('is looked at in every part of a result', () => {
    const { temperature, time, links, clusters, outliers, unitsBeyond } = fixedResult();
    expect(temperature).not.toBeNull();
    expect(time).not.toBeNull();
    expect(links).toHaveLength(2);
    expect(clusters).toBeDefined();
    expect(outliers.count).toBeGreaterThan(0);
    expect(unitsBeyond.length).toBeGreaterThan(0);
  });
});
