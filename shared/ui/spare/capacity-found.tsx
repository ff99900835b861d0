import { View } from 'react-native';
import type { SpareCapacityDto, SpareDto } from '@/shared/contract/spare';
import { date } from '../format/clock';
import { useFormats } from '../format/formats';
import { ampHours, capacityBand } from '../format/quantities';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { capacityBandOf, figureBandOf } from './spare-words';

/** What a charge has found of the capacity and what was known do not agree: a person takes the one or leaves it. */
export function CapacityFound({
  spare,
  found,
  now,
  offline,
  busy,
  problem,
  onAnswer,
  onOpenCharge,
}: {
  spare: Pick<SpareDto, 'label' | 'usedCapacityAh' | 'capacitySdAh'>;
  found: SpareCapacityDto;
  now: number;
  offline: boolean;
  busy: boolean;
  problem: string | null;
  onAnswer: (answer: 'take' | 'leave') => void;
  onOpenCharge: (id: string) => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const band = figureBandOf(found);
  const known = capacityBandOf(spare);
  const day = date(Date.parse(found.at), zone, now);
  const { chargeId } = found;
  return (
    <CallOut tone="amber" label={`${spare.label}: a charge found another capacity`}>
      <Txt
        bold
      >{`The charge of ${day} found ${ampHours(found.ampHours, marks)} a group, not ${ampHours(spare.usedCapacityAh, marks)}.`}</Txt>
      <Txt>
        {`Its readings before and after give ${capacityBand(band.low, band.likely, band.high, marks)}, plans go by ${capacityBand(known.low, known.likely, known.high, marks)}.`}
      </Txt>
      <Txt style={styles.check}>
        Check first: whether both readings were of this module at rest, with which meter, and whether the counted amps
        were right.
      </Txt>
      {chargeId ? (
        <Link kind="small" title="Open that charge" onPress={() => onOpenCharge(chargeId)} style={styles.link} />
      ) : null}
      {problem ? (
        <Txt kind="label" tone="alarm" role="alert">
          {problem}
        </Txt>
      ) : null}
      {offline ? (
        <Txt kind="small" tone="ink2" nativeID="capacity-why">
          Taking or leaving it needs the connection.
        </Txt>
      ) : null}
      <View style={styles.acts}>
        <Button
          look="line"
          title="Leave it"
          disabled={offline}
          busy={busy}
          describedBy={offline ? 'capacity-why' : undefined}
          onPress={() => onAnswer('leave')}
        />
        <Button
          look="line"
          grow
          title={`Take ${ampHours(found.ampHours, marks)}`}
          disabled={offline}
          busy={busy}
          describedBy={offline ? 'capacity-why' : undefined}
          onPress={() => onAnswer('take')}
        />
      </View>
    </CallOut>
  );
}

const useStyles = makeStyles(() => ({
  check: { marginTop: 6 },
  link: { alignSelf: 'flex-start' },
  acts: { flexDirection: 'row', columnGap: 8, marginTop: 8 },
}));
