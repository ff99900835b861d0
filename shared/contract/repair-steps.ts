/** Steps of a repair, free of its schemas: the bench needs no more of it. */

/** The seven steps of the strip, in their order. */
export const repairSteps = ['read', 'second-source', 'target', 'spare', 'charge', 'fit', 'prove'] as const;
export type RepairStep = (typeof repairSteps)[number];
export const repairStepNames: Record<RepairStep, string> = {
  read: 'Read',
  'second-source': 'Second source',
  target: 'Target',
  spare: 'Spare',
  charge: 'Charge',
  fit: 'Fit',
  prove: 'Prove',
};
