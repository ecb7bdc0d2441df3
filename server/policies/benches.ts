interface Chamber {
  chamberLowC: number | null;
  chamberHighC: number | null;
}

/** Why this is no temperature range of a chamber, or null. A bench without a chamber names neither end. */
export function whyNotChamber({ chamberLowC, chamberHighC }: Chamber): string | null {
  if (chamberLowC === null && chamberHighC === null) return null;
  if (chamberLowC === null || chamberHighC === null)
    return 'Name both ends of the temperature range, or neither.';
  return chamberLowC < chamberHighC ? null : 'The upper end must be above the lower end.';
}

/** A calibration counts through its due date (ISO dates). */
export function isInCalibration(calibrationDue: string, today: string): boolean {
  return calibrationDue >= today;
}
