import { describe, expect, it } from 'vitest';
import { isInCalibration, whyNotChamber } from '../../../server/policies/benches';
import { whyNotDisable, whyNotRole } from '../../../server/policies/people';

const admin = { id: 'a', role: 'administrator', state: 'active' } as const;
const technician = { id: 't', role: 'technician', state: 'active' } as const;

describe('disabling a person', () => {
  it('is allowed for others', () => {
    expect(whyNotDisable('a', technician, 1)).toBeNull();
    expect(whyNotDisable('b', admin, 2)).toBeNull();
    expect(whyNotDisable('a', { ...technician, state: 'invited' }, 1)).toBeNull();
  });
  it('is not allowed for oneself, twice, or for the last administrator', () => {
    expect(whyNotDisable('a', admin, 2)).toMatch(/own account/);
    expect(whyNotDisable('a', { ...technician, state: 'disabled' }, 1)).toMatch(/already/);
    expect(whyNotDisable('b', admin, 1)).toMatch(/only active administrator/);
  });
  it('of an administrator who never came leaves the others untouched', () => {
    expect(whyNotDisable('b', { ...admin, state: 'invited' }, 1)).toBeNull();
  });
});

describe('giving a role', () => {
  it('is allowed to others, and keeping a role always', () => {
    expect(whyNotRole('a', technician, 'auditor', 1)).toBeNull();
    expect(whyNotRole('a', admin, 'administrator', 1)).toBeNull();
  });
  it('is not allowed to oneself, and not away from the last administrator', () => {
    expect(whyNotRole('a', admin, 'auditor', 2)).toMatch(/own role/);
    expect(whyNotRole('b', admin, 'auditor', 1)).toMatch(/only active administrator/);
  });
});

describe('a bench', () => {
  it('is in calibration through the due date', () => {
    expect(isInCalibration('2030-05-31', '2030-05-31')).toBe(true);
    expect(isInCalibration('2030-05-31', '2030-06-01')).toBe(false);
  });
  it('has a chamber with both ends in order, or none', () => {
    expect(whyNotChamber({ chamberLowC: null, chamberHighC: null })).toBeNull();
    expect(whyNotChamber({ chamberLowC: -40, chamberHighC: 85 })).toBeNull();
    expect(whyNotChamber({ chamberLowC: 25, chamberHighC: 25 })).toMatch(/above/);
    expect(whyNotChamber({ chamberLowC: null, chamberHighC: 85 })).toMatch(/both/);
  });
});
