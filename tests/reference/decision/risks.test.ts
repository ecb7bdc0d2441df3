import { describe, expect, it } from 'vitest';
import { acceptanceLimits, riskAtAcceptanceLimit } from '@shared/decision/guard-band';
import { globalRisk } from '@shared/decision/global-risk';
import { type DecisionRule, isBeyond } from '@shared/decision/rule';
import { conformingProbability, posterior, specificRisk } from '@shared/decision/specific-risk';
import { expectCase } from './cases';
import guard from '../data/decision/guard.json';
import global from '../data/decision/risk-global.json';
import specific from '../data/decision/risk-specific.json';

// Source: JCGM 106:2012 clauses 7 to 9, ISO 14253-1:2017, ILAC-G8:09/2019, as named in each case of the data files.

interface SpecificInputs {
  measured_ppm: number;
  standard_uncertainty_ppm: number;
  lower_limit_ppm: number;
  upper_limit_ppm: number;
  process_mean_ppm?: number;
  process_sd_ppm?: number;
}

describe('specific risk', () => {
  it.each(specific.cases)('$id $name', (each) => {
    const inputs: SpecificInputs = each.inputs;
    const { measured_ppm: measured, standard_uncertainty_ppm: u } = inputs;
    const limits = { lowPpm: inputs.lower_limit_ppm, highPpm: inputs.upper_limit_ppm };
    if (inputs.process_mean_ppm !== undefined) {
      const after = posterior(measured, u, {
        meanPpm: inputs.process_mean_ppm,
        sdPpm: inputs.process_sd_ppm!,
      });
      expectCase(each, {
        posterior_mean_ppm: after.meanPpm,
        posterior_sd_ppm: after.sdPpm,
        prob_conforming: conformingProbability(after.meanPpm, after.sdPpm, limits).conforming,
      });
      return;
    }
    const probability = conformingProbability(measured, u, limits);
    const accepted = !isBeyond(measured, limits);
    const { kind, risk } = specificRisk(probability, accepted);
    expectCase(each, {
      prob_conforming: probability.conforming,
      simple_acceptance: accepted,
      specific_risk_of_the_simple_decision: risk,
      specific_risk_kind: kind,
    });
  });
});

describe('global risk', () => {
  it.each(global.cases)('$id $name', (each) => {
    const { inputs } = each;
    const limits = { lowPpm: inputs.lower_limit_ppm, highPpm: inputs.upper_limit_ppm };
    const u = inputs.measurement_sd_ppm;
    const rule: DecisionRule = { kind: 'guardedAcceptance', factor: inputs.guard_factor };
    const acceptance = acceptanceLimits(limits, rule, u);
    const risk = globalRisk(
      { meanPpm: inputs.process_mean_ppm, sdPpm: inputs.process_sd_ppm },
      u,
      limits,
      acceptance,
    );
    expectCase(each, {
      acceptance_low_ppm: acceptance.lowPpm,
      acceptance_high_ppm: acceptance.highPpm,
      prob_conforming_before: risk.conformingBefore,
      prob_accept: risk.accepted,
      global_consumer_risk: risk.consumersRisk,
      global_producer_risk: risk.producersRisk,
      conforming_fraction_of_accepted: risk.conformingOfAccepted,
    });
    // What is accepted is what conforms and is not refused, and what does not conform and slips through.
    expect(risk.conformingBefore - risk.producersRisk + risk.consumersRisk).toBeCloseTo(
      risk.accepted,
      12,
    );
  });
});

describe('guard bands', () => {
  it.each(guard.cases)('$id $name, $inputs.rule', (each) => {
    const { inputs } = each;
    const factor = Number(/^w=([\d.]+)U?/.exec(inputs.rule)![1]);
    const rule: DecisionRule =
      factor === 0 ? { kind: 'simple' } : { kind: 'guardedAcceptance', factor };
    const limits = { lowPpm: inputs.lower_limit_ppm, highPpm: inputs.upper_limit_ppm };
    const acceptance = acceptanceLimits(limits, rule, inputs.expanded_uncertainty_ppm);
    expectCase(each, {
      acceptance_low_ppm: acceptance.lowPpm,
      acceptance_high_ppm: acceptance.highPpm,
      prob_nonconforming_at_acceptance_limit: riskAtAcceptanceLimit(
        limits,
        rule,
        inputs.expanded_uncertainty_ppm,
        inputs.coverage_factor,
      ),
    });
  });

  it('takes 2.3 % at the acceptance limit for w = U, k = 2 (ILAC-G8:09/2019, rounded there to 2.5 %)', () => {
    const risk = riskAtAcceptanceLimit(
      { lowPpm: -20, highPpm: 20 },
      { kind: 'guardedAcceptance', factor: 1 },
      1,
      2,
    );
    expect(risk).toBeCloseTo(0.0227501319481792, 12);
  });
});

describe('number of cases', () => {
  it('is that of the source', () => {
    expect([specific.cases.length, global.cases.length, guard.cases.length]).toEqual([7, 8, 3]);
  });
});
