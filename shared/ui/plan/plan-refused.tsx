import { View } from 'react-native';
import type { Refusal } from '@/calc/plan-types';
import type { SpareDto } from '@/shared/contract/spare';
import { useFormats } from '../format/formats';
import { voltsNumber } from '../format/quantities';
import { LevelColumn } from '../level-column/level-column';
import { CallOut } from '../primitives/call-out';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';

/** The numbers rule this charge out. There is no way round it here; the texts say what to do. */
export function PlanRefused({
  spare,
  refusals,
  targetVolts,
}: {
  spare: SpareDto;
  refusals: readonly Refusal[];
  targetVolts: number;
}) {
  const { marks } = useFormats();
  const groups = spare.reading?.groupVolts ?? [];
  const low = Math.min(spare.floorVolts, ...groups) - 0.1;
  return (
    <CallOut tone="red" announce label={`${spare.label} is not to be charged`}>
      <View style={{ flexDirection: 'row', justifyContent: 'space-between', marginBottom: 10 }}>
        <StageTag stage="overdue" text="Not to be charged" />
        <Txt kind="label">{spare.label}</Txt>
      </View>
      {groups.length > 0 ? (
        <LevelColumn
          place="live"
          stage="planned"
          groups={groups.map((volts, index) => ({
            volts,
            odd: refusals.some((refusal) => refusal.group === index),
            text: voltsNumber(volts, marks),
          }))}
          targetVolts={targetVolts}
          scale={{ kind: 'window', lowVolts: low, highVolts: Math.max(spare.chargeLimitVolts, targetVolts) }}
          floorVolts={spare.floorVolts}
          name={spare.label}
          labels
          ends
          tab
        />
      ) : null}
      <View style={{ rowGap: 6, marginTop: 10 }}>
        {refusals.map((refusal) => (
          <Txt key={refusal.text} bold>
            {refusal.text}
          </Txt>
        ))}
      </View>
    </CallOut>
  );
}
