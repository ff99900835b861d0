import type { MigrationInterface, QueryRunner } from 'typeorm';
import { addColumns, dropColumns } from './add-columns';

const columns = {
  module_type: {
    curve_id: 'varchar',
    own_curve: 'text',
    pulse_short_s: 'double precision',
    pulse_short_milliohm: 'double precision',
    pulse_longer_s: 'double precision',
    pulse_longer_milliohm: 'double precision',
    cold_current_percent: 'double precision',
    warm_current_percent: 'double precision',
    precharge_below_volts: 'double precision',
  },
  channel: {
    display_step_amps: 'double precision',
    leads_measured: 'boolean',
    derating_above_celsius: 'double precision',
    derating_percent: 'double precision',
    duty_percent: 'double precision',
  },
} as const;

/** Curves of a workshop's own, and what modules and chargers do that their limits do not tell. */
export class Behaviours1765100000000 implements MigrationInterface {
  readonly name = 'Behaviours1765100000000';

  up(runner: QueryRunner): Promise<void> {
    return addColumns(runner, columns);
  }

  down(runner: QueryRunner): Promise<void> {
    return dropColumns(runner, columns);
  }
}
