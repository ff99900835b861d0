import type { ChemistryId } from '../plan-types';
import type { OcvTable } from '../types';
import { CHEMISTRIES } from './chemistries';
import { LFP_MEASURED_CHARGE, LFP_MEASURED_DISCHARGE, LFP_MEASURED_MEAN } from './lfp-measured';
import { LMO_BLEND_MEASURED } from './lmo-blend-measured';
import { LTO_LMO_CURVE } from './lto-half-cells';
import { NIMH_NREL } from './nimh-nrel';
import { NMC811_CHEN_2020 } from './nmc811-chen-2020';
import { NMC_MOHTAT_2020 } from './nmc-mohtat-2020';

/** A curve that is shipped, to be chosen for a module type. */
export interface PublishedCurve {
  /** As in SOURCES.md. */
  id: string;
  chemistry: ChemistryId;
  /** As a person reads it in a list. */
  name: string;
  /** Where it comes from, in a few words. */
  source: string;
  curve: OcvTable;
}

export const PUBLISHED_CURVES: readonly PublishedCurve[] = [
  {
    id: 'nmc-mohtat-2020',
    chemistry: 'nmc',
    name: 'NMC, 5 Ah pouch cell',
    source: 'P. Mohtat et al. (2020)',
    curve: NMC_MOHTAT_2020,
  },
  {
    id: 'nmc811-chen-2020',
    chemistry: 'nmc',
    name: 'NMC 811, 5 Ah 21700 cell',
    source: 'C.-H. Chen et al., J. Electrochem. Soc. 167 (2020) 080534',
    curve: NMC811_CHEN_2020,
  },
  {
    id: 'lmo-blend-measured',
    chemistry: 'lmo-blend',
    name: 'LMO blend, 33 Ah pouch cell',
    source: 'measured, batterysim/equiv-circ-model',
    curve: LMO_BLEND_MEASURED,
  },
  {
    id: 'lfp-measured',
    chemistry: 'lfp',
    name: 'LFP, 2.3 Ah cell, mean of both branches',
    source: 'measured, batterysim/esctoolbox-python',
    curve: LFP_MEASURED_MEAN,
  },
  {
    id: 'lfp-measured-charge',
    chemistry: 'lfp',
    name: 'LFP, 2.3 Ah cell, after a charge',
    source: 'measured, batterysim/esctoolbox-python',
    curve: LFP_MEASURED_CHARGE,
  },
  {
    id: 'lfp-measured-discharge',
    chemistry: 'lfp',
    name: 'LFP, 2.3 Ah cell, after a discharge',
    source: 'measured, batterysim/esctoolbox-python',
    curve: LFP_MEASURED_DISCHARGE,
  },
  {
    id: 'lto-half-cells',
    chemistry: 'lto',
    name: 'LTO against LMO, from half cells',
    source: 'M. Doyle et al., J. Electrochem. Soc. 143 (1996) 1890; LTO plateau 1.55 V',
    curve: LTO_LMO_CURVE,
  },
  {
    id: 'nimh-nrel',
    chemistry: 'nimh',
    name: 'NiMH, 6.5 Ah',
    source: 'measured by NREL',
    curve: NIMH_NREL,
  },
];

/** The curves of a chemistry, the one that is used unasked first. */
export function publishedCurves(chemistry: ChemistryId): PublishedCurve[] {
  const unasked = CHEMISTRIES[chemistry].curveId;
  return PUBLISHED_CURVES.filter((one) => one.chemistry === chemistry).sort(
    (a, b) => Number(b.id === unasked) - Number(a.id === unasked),
  );
}
