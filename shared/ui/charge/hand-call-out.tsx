import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { ampHours } from '../format/quantities';
import { useFormats } from '../format/formats';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { makeStyles } from '../theme/make-styles';
import { channelsOf, isFlowing } from './card-model';

/** What waits for a hand inside the charge: the clips to be moved, or the current to be switched off. */
export function HandCallOut({
  charge,
  busy,
  disabled,
  describedBy,
  onSwapped,
  onOff,
  onOffEarlier,
}: {
  charge: ChargeDto;
  busy: boolean;
  disabled: boolean;
  describedBy?: string;
  /** The clips were moved: the next step runs. */
  onSwapped: () => void;
  /** It is off since now. */
  onOff: () => void;
  /** It went off at a time to be typed. */
  onOffEarlier: () => void;
}) {
  const styles = useStyles();
  const { marks } = useFormats();
  if (charge.nextHand === null) return null;
  const swap = isFlowing(charge);
  const what = channelsOf(charge) || 'It';
  const done = `${ampHours(charge.deliveredAh, marks)} are ${charge.direction === 'discharge' ? 'out' : 'in'}.`;
  return (
    <CallOut tone="amber" label="A hand is needed">
      <StageTag stage="check-due" text="A hand is needed" />
      <Txt kind="heading" style={styles.what}>
        {charge.nextHand}
      </Txt>
      <Txt tone="ink2">
        {swap
          ? `${done} Nothing flows until the next step is begun.`
          : charge.finish === 'over-and-settle'
            ? `${done} It does not stop by itself.`
            : `${done} The current has tapered to the mark.`}
      </Txt>
      <View style={styles.acts}>
        {swap ? (
          <Button
            title="Done, the next step runs"
            onPress={onSwapped}
            busy={busy}
            disabled={disabled}
            describedBy={describedBy}
            grow
          />
        ) : (
          <>
            <Button
              title={`${what} is off now`}
              onPress={onOff}
              busy={busy}
              disabled={disabled}
              describedBy={describedBy}
              grow
            />
            <Button
              look="line"
              title="Off earlier"
              label="It was switched off earlier"
              onPress={onOffEarlier}
              disabled={disabled}
              describedBy={describedBy}
            />
          </>
        )}
      </View>
    </CallOut>
  );
}

const useStyles = makeStyles(() => ({
  what: { marginTop: 8, marginBottom: 2 },
  acts: { flexDirection: 'row', columnGap: 8, marginTop: 12 },
}));
