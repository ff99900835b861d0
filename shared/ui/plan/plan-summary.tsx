import { View } from 'react-native';
import type { SpareDto } from '@/shared/contract/spare';
import type { PlanDto, PlanRequest } from '@/shared/contract/plan';
import { age } from '../format/clock';
import { useFormats } from '../format/formats';
import { ampHours, share, tolerance, volts, voltsNumber } from '../format/quantities';
import { LevelColumn } from '../level-column/level-column';
import { FactList } from '../primitives/fact-list';
import { makeStyles } from '../theme/make-styles';
import { useBreakpoint } from '../theme/use-breakpoint';
import { apartVolts, isCapacityGuessed, readBeforeWords, sourceWords } from '../spare/spare-words';

/** From spare to pack: the groups as they are reckoned to rest now, the target across them, what has to be brought in. */
export function PlanSummary({
  spare,
  request,
  dto,
  now,
}: {
  spare: SpareDto;
  /** Null while the target is not typed. */
  request: PlanRequest | null;
  dto: PlanDto | null;
  now: number;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const wide = useBreakpoint() === 'wide';
  const groups = dto?.plan.startVolts ?? spare.reading?.groupVolts ?? [];
  if (groups.length === 0) return null;
  const many = groups.length > 4;
  const target = dto?.targetVolts ?? request?.targetVolts ?? spare.shelfVolts ?? spare.chargeLimitVolts;
  const out = dto?.plan.direction === 'discharge';
  const column = (
    <LevelColumn
      place={wide ? 'live' : 'list'}
      size={
        wide ? (many ? { h: 200 } : { h: 220, w: 64, gap: 16 }) : many ? { h: 84 } : { h: 84, w: 24, gap: 7, stroke: 2 }
      }
      stage={out ? 'discharging' : 'charging'}
      groups={groups.map((value) => ({
        volts: value,
        odd: value < spare.floorVolts,
        text: wide && !many ? voltsNumber(value, marks) : undefined,
      }))}
      targetVolts={target}
      scale={{ kind: 'window', lowVolts: spare.dischargeLimitVolts, highVolts: spare.chargeLimitVolts }}
      name={spare.label}
      labels={wide}
      ends={wide}
      tab
    />
  );
  const lowest = Math.min(...groups);
  const needs = dto?.plan.groupAmpHours.map(Math.abs) ?? [];
  const each = needs.length > 0 ? Math.max(...needs) : null;
  const facts = [
    ...(request
      ? [
          {
            name: 'Target',
            value:
              request.targetVolts === null ? share((request.targetSoc ?? 0) / 100) : volts(request.targetVolts, marks),
            note:
              request.targetVolts === null ? 'of charge' : dto ? tolerance(dto.toleranceMillivolts / 1000) : undefined,
          },
        ]
      : []),
    wide
      ? { name: 'Groups apart', value: `${Math.round(apartVolts(groups) * 1000)}\u00a0mV` }
      : { name: spare.label, value: volts(lowest, marks), note: 'lowest' },
    ...(each === null
      ? []
      : [{ name: out ? 'To take out' : 'To bring in', value: ampHours(each, marks), note: 'each' }]),
    ...(wide
      ? [
          {
            name: 'Capacity',
            value: ampHours(spare.usedCapacityAh, marks),
            note: isCapacityGuessed(spare) ? 'guessed' : sourceWords[spare.capacitySource],
          },
          ...(spare.reading
            ? [
                {
                  name: 'Read',
                  value: readBeforeWords(spare) ? 'to be read again' : age(Date.parse(spare.reading.at), zone, now),
                },
              ]
            : []),
        ]
      : []),
  ];
  if (wide)
    return (
      <View style={styles.stack}>
        {column}
        <FactList facts={facts} />
      </View>
    );
  return (
    <View style={styles.beside}>
      {column}
      <View style={styles.facts}>
        <FactList tight facts={facts} />
      </View>
    </View>
  );
}

const useStyles = makeStyles(() => ({
  stack: { rowGap: 14 },
  beside: { flexDirection: 'row', alignItems: 'center', columnGap: 16 },
  facts: { flex: 1, minWidth: 0 },
}));
