import { View } from 'react-native';
import type { PlanPersonDto } from '@/shared/contract/bench-plan';
import { firstName } from '../charge/card-model';
import { useFormats } from '../format/formats';
import { Hidden } from '../primitives/live-region';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { DockLane } from '../wait-ribbon/dock-lane';
import { LookInHead } from './lane-charge';
import { absence, personDocks, personPegs } from './person-pieces';
import type { PlanAxis } from './plan-axis';

export const personRowHeight = 55;

/** The lane of a person: docks of what they do, free time dashed, look-ins over them. */
export function PersonLane({
  person,
  axis,
  now,
  nameWidth,
  onFree,
}: {
  person: PlanPersonDto;
  axis: PlanAxis;
  now: number;
  nameWidth: number;
  /** Shows what fits the free time of this person. */
  onFree: () => void;
}) {
  const styles = useStyles();
  const formats = useFormats();
  const spanS = (axis.to - axis.from) / 1000;
  const away = absence(person);
  const docks = personDocks(person, axis, now, formats, onFree);
  const pegs = personPegs(person.lookIns, axis, now, formats).filter(({ s }) => s >= 0 && s <= spanS);
  const name = firstName(person.person.name);
  return (
    <View style={styles.lane}>
      <View style={[styles.name, { width: nameWidth }]}>
        <Txt bold heading={3} numberOfLines={1}>
          {name}
        </Txt>
        {pegs.length > 0 ? <Hidden>{pegs.map(({ label }) => label).join('. ')}</Hidden> : null}
      </View>
      <View style={[styles.room, { width: axis.width }]}>
        {away !== null && docks.length === 0 ? (
          <Txt kind="small" tone="ink2" style={styles.away}>
            {away}
          </Txt>
        ) : null}
        {docks.length > 0 ? (
          <View style={styles.docks}>
            <DockLane docks={docks} fromS={0} toS={spanS} width={axis.width} height={32} label={`What ${name} does`} />
          </View>
        ) : null}
        {pegs.map((peg) => (
          <LookInHead
            key={peg.key}
            x={(peg.s / spanS) * axis.width}
            top={0}
            state={peg.state === 'done' ? 'done' : 'later'}
            missed={peg.missed}
            stem
          />
        ))}
      </View>
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  lane: {
    flexDirection: 'row',
    alignItems: 'center',
    height: personRowHeight,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  name: { flexShrink: 0, paddingRight: 8 },
  room: { height: personRowHeight - 1 },
  docks: { position: 'absolute', top: 14, left: 0 },
  away: { lineHeight: personRowHeight - 1 },
}));
