import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { duration } from '../format/duration';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { ampHours, clipVolts, plannedAmps, tolerance, volts } from '../format/quantities';
import { FactList, type Fact } from '../primitives/fact-list';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { channelsOf } from './card-model';

const wayWords: Record<ChargeDto['way'], string> = {
  terminals: 'Through the terminals',
  'group-by-group': 'Group by group',
  paralleled: 'Groups paralleled',
  resistor: 'Through a resistor',
};
const finishWords: Record<ChargeDto['finish'], string> = {
  'on-the-mark': 'on the mark',
  'over-and-settle': 'over and settle',
};

/** A set voltage is rounded so that a forgotten charge stays safe: down when charging, up when discharging. */
const safeVolts = (value: number, charging: boolean): number =>
  (charging ? Math.floor(value * 100 + 1e-6) : Math.ceil(value * 100 - 1e-6)) / 100;

/** What is clipped on where, and what the charger is set to for the first step. */
export function WhatToSet({ charge, now }: { charge: ChargeDto; now: number }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const step = charge.option.steps[0];
  const channel = channelsOf(charge) || 'Resistor';
  const facts: Fact[] = [
    { name: 'Clip on', value: moment(Date.parse(charge.clipOnAt), zone, now, marks) },
    { name: 'At', value: channel },
    ...(step?.setVolts == null
      ? []
      : [{ name: 'Set voltage', value: clipVolts(safeVolts(step.setVolts, step.direction === 'charge'), marks) }]),
    ...(step?.setAmps == null ? [] : [{ name: 'Set current', value: plannedAmps(step.setAmps, marks) }]),
    { name: 'Target', value: volts(charge.targetVolts, marks), note: tolerance(charge.toleranceVolts) },
    {
      name: charge.direction === 'discharge' ? 'Takes out' : 'Brings in',
      value: ampHours(charge.plannedAh, marks),
    },
    { name: 'Look-ins and hands', value: duration(charge.option.handsOnS) },
  ];
  return (
    <View>
      <Txt kind="heading" heading={2}>
        What to set
      </Txt>
      <Txt tone="ink2" style={styles.way}>
        {`${wayWords[charge.way]}, ${finishWords[charge.finish]}${charge.option.steps.length > 1 ? `, first of ${charge.option.steps.length} steps` : ''}.`}
      </Txt>
      <FactList facts={facts} />
      <Txt kind="small" tone="ink2" style={styles.takes}>
        {charge.option.takes}
      </Txt>
    </View>
  );
}

const useStyles = makeStyles(() => ({ way: { marginBottom: 4 }, takes: { marginTop: 6 } }));
