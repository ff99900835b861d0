/** What people call the parts of a wait and what waits are told apart by: on a screen, in a file and in a letter. */
import type { WaitDimension, WaitStage, WaitsQuery } from './waits';

export const stageNames: Record<WaitStage, string> = {
  queue: 'Queue',
  charging: 'Charging',
  tapering: 'Tapering',
  resting: 'Resting',
  'check-due': 'Check due',
};

export const wayNames: Record<NonNullable<WaitsQuery['way']>, string> = {
  terminals: 'Through the terminals',
  'group-by-group': 'Group by group',
  paralleled: 'Groups paralleled',
  resistor: 'Through a resistor',
};

export const weekdayNames: Record<NonNullable<WaitsQuery['weekday']>, string> = {
  '1': 'Monday',
  '2': 'Tuesday',
  '3': 'Wednesday',
  '4': 'Thursday',
  '5': 'Friday',
  '6': 'Saturday',
  '7': 'Sunday',
};

export const dimensionNames: Record<WaitDimension, string> = {
  'module-type': 'Module type',
  charger: 'Charger',
  channel: 'Channel',
  technician: 'Technician',
  way: 'Way',
  weekday: 'Weekday',
};
