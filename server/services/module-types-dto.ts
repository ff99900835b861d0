import type { ModuleTypeDto } from '@/shared/contract/equipment';
import type { ModuleType } from '../entities/module-type';
import type { TypeUse } from '../repositories/module-types.repository';

export const moduleTypeDto = (type: ModuleType, use: TypeUse | undefined): ModuleTypeDto => ({
  id: type.id,
  name: type.name,
  chemistry: type.chemistry,
  groupsInSeries: type.groupsInSeries,
  cellsInParallel: type.cellsInParallel,
  ratedAh: type.ratedAh,
  chargeLimitVolts: type.chargeLimitVolts,
  dischargeLimitVolts: type.dischargeLimitVolts,
  floorVolts: type.floorVolts,
  maxChargeAmps: type.maxChargeAmps,
  maxDischargeAmps: type.maxDischargeAmps,
  minChargeCelsius: type.minChargeCelsius,
  maxChargeCelsius: type.maxChargeCelsius,
  resistanceMilliohm: type.resistanceMilliohm,
  resistanceKind: type.resistanceKind,
  linkMilliohm: type.linkMilliohm,
  shelfVolts: type.shelfVolts,
  selfDischargePercentPerMonth: type.selfDischargePercentPerMonth,
  note: type.note,
  spareCount: use?.spares ?? 0,
  chargeCount: use?.charges ?? 0,
  rev: type.rev,
});
