import type { ChemistryId } from '../plan-types';
import type { OcvTable } from '../types';
import { LFP_MEASURED_MEAN } from './lfp-measured';
import { LMO_BLEND_MEASURED } from './lmo-blend-measured';
import { LTO_LMO_CURVE } from './lto-half-cells';
import { NIMH_COULOMBIC_EFFICIENCY, NIMH_NREL } from './nimh-nrel';
import { NMC_MOHTAT_2020 } from './nmc-mohtat-2020';

/** dU/dT by state of charge, V/K; straight between the points, level beyond them. */
export interface TemperatureCoefficient {
  soc: number[];
  voltsPerKelvin: number[];
}

/** All voltages per cell, which is per group. */
export interface ChemistryParameters {
  id: ChemistryId;
  curve: OcvTable;
  /** Name of the curve in SOURCES.md. */
  curveId: string;
  chargeLimitVolts: number;
  dischargeLimitVolts: number;
  /** A group that rests below this is not charged here at all. */
  recoveryFloorVolts: number;
  minChargeCelsius: number;
  maxChargeCelsius: number;
  polarisationTimeConstantS: number;
  /** Share of the charge that stays; while charging only. */
  coulombicEfficiency: number;
  /** A rest voltage may lie this far to either side of the curve, as the cell was last charged or discharged. */
  hysteresisVolts: number;
  /** Share of the capacity a month on the shelf. */
  selfDischargePerMonth: number;
  /** Long resistance at 25 °C times capacity, Ω·Ah. */
  resistanceOhmAh: number;
  /** State of charge to keep spares at. */
  storageSoc: { low: number; high: number };
  temperatureCoefficient: TemperatureCoefficient | null;
  /** Where the curve is so flat that a voltage says little of the charge. */
  plateau: { fromSoc: number; toSoc: number } | null;
}

/*
 * Where a number has no source beside it in SOURCES.md it is a guess; the marks there are: measured, published,
 * common practice, from memory, guess.
 */
export const CHEMISTRIES: Record<ChemistryId, ChemistryParameters> = {
  nmc: {
    id: 'nmc',
    curve: NMC_MOHTAT_2020,
    curveId: 'nmc-mohtat-2020',
    chargeLimitVolts: 4.2,
    dischargeLimitVolts: 2.8,
    recoveryFloorVolts: 2.5,
    minChargeCelsius: 0,
    maxChargeCelsius: 45,
    polarisationTimeConstantS: 200,
    coulombicEfficiency: 1,
    hysteresisVolts: 0,
    selfDischargePerMonth: 0.025,
    resistanceOhmAh: 0.094,
    storageSoc: { low: 0.3, high: 0.5 },
    temperatureCoefficient: {
      soc: [0.1, 0.2, 0.5, 0.7, 0.9],
      voltsPerKelvin: [-0.36e-3, -0.09e-3, 0.015e-3, 0.04e-3, 0.065e-3],
    },
    plateau: null,
  },
  'lmo-blend': {
    id: 'lmo-blend',
    curve: LMO_BLEND_MEASURED,
    curveId: 'lmo-blend-measured',
    chargeLimitVolts: 4.2,
    dischargeLimitVolts: 2.7,
    recoveryFloorVolts: 2.5,
    minChargeCelsius: 0,
    maxChargeCelsius: 45,
    polarisationTimeConstantS: 300,
    coulombicEfficiency: 1,
    hysteresisVolts: 0,
    selfDischargePerMonth: 0.025,
    resistanceOhmAh: 0.132,
    storageSoc: { low: 0.3, high: 0.5 },
    temperatureCoefficient: null,
    plateau: null,
  },
  lfp: {
    id: 'lfp',
    curve: LFP_MEASURED_MEAN,
    curveId: 'lfp-measured',
    chargeLimitVolts: 3.6,
    dischargeLimitVolts: 2.5,
    recoveryFloorVolts: 2.0,
    minChargeCelsius: 0,
    maxChargeCelsius: 45,
    polarisationTimeConstantS: 300,
    coulombicEfficiency: 1,
    hysteresisVolts: 0.025,
    selfDischargePerMonth: 0.025,
    resistanceOhmAh: 0.14,
    storageSoc: { low: 0.3, high: 0.5 },
    temperatureCoefficient: null,
    plateau: { fromSoc: 0.3, toSoc: 0.95 },
  },
  lto: {
    id: 'lto',
    curve: LTO_LMO_CURVE,
    curveId: 'lto-half-cells',
    chargeLimitVolts: 2.8,
    dischargeLimitVolts: 1.5,
    recoveryFloorVolts: 1.5,
    minChargeCelsius: 0,
    maxChargeCelsius: 45,
    polarisationTimeConstantS: 100,
    coulombicEfficiency: 1,
    hysteresisVolts: 0,
    selfDischargePerMonth: 0.025,
    resistanceOhmAh: 0.06,
    storageSoc: { low: 0.3, high: 0.5 },
    temperatureCoefficient: null,
    plateau: null,
  },
  nimh: {
    id: 'nimh',
    curve: NIMH_NREL,
    curveId: 'nimh-nrel',
    chargeLimitVolts: 1.5,
    dischargeLimitVolts: 1.0,
    recoveryFloorVolts: 0.9,
    minChargeCelsius: 0,
    maxChargeCelsius: 45,
    polarisationTimeConstantS: 60,
    coulombicEfficiency: NIMH_COULOMBIC_EFFICIENCY,
    hysteresisVolts: 0.045,
    selfDischargePerMonth: 0.2,
    resistanceOhmAh: 0.0228,
    storageSoc: { low: 0.3, high: 0.5 },
    temperatureCoefficient: null,
    plateau: { fromSoc: 0.2, toSoc: 0.85 },
  },
};
