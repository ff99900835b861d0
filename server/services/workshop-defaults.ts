import type { WorkshopSettings } from '@/shared/contract/workshop';

/** Settings a new workshop begins with; all of them can be changed on its settings page. */
export const defaultSettings = (name: string, zone: string): Required<WorkshopSettings> => ({
  name,
  zone,
  workingHours: [
    ...Array.from({ length: 5 }, () => ({ from: '08:00', to: '17:00' })), // Monday to Friday
    null,
    null,
  ],
  toleranceMillivolts: 5,
  minRestMinutes: 60,
  lookInMinutes: 60,
  inrushLimitC: 1,
  lagLimitMillivolts: 20,
  technicianDecides: false,
  unattendedCharges: false,
  lookInVisitMinutes: 5,
  fitMinutes: 60,
  passOnTellMinutes: 0,
  passOnAmberMinutes: 10,
  passOnAlarmMinutes: 5,
});
