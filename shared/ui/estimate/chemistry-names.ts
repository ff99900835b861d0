/** Chemistries in words, in the order they are offered. Apart from the contract, whose schemas the first paint does without. */
import type { ChemistryId } from '@/calc/plan-types';

export const chemistryChoices: readonly { value: ChemistryId; label: string }[] = [
  { value: 'nmc', label: 'Lithium, graphite and NMC' },
  { value: 'lmo-blend', label: 'Lithium, graphite and LMO blend' },
  { value: 'lfp', label: 'Lithium, graphite and LFP' },
  { value: 'lto', label: 'Lithium titanate (LTO)' },
  { value: 'nimh', label: 'NiMH' },
];
