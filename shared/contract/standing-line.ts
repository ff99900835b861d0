/** The line that stands on every plan and at the foot of every sheet. */
export const standingLine =
  'An aid to trained people. The maker’s limits, your risk assessment and local codes come first.';
