import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { moment } from '../format/clock';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { Button } from '../primitives/button';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { channelsOf, firstName, isFlowing, isToCome, isUnderWay, waitsForSwap } from './card-model';
import { isDueEarly } from './rest-words';

/** Look-in due or to come, and the tap that does it. */
export function LookInLine({
  charge,
  now,
  busy,
  disabled,
  describedBy,
  onDone,
}: {
  charge: ChargeDto;
  now: number;
  busy: boolean;
  disabled: boolean;
  describedBy?: string;
  onDone: () => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  if (!isUnderWay(charge) || charge.nextLookInAt === null) return null;
  const at = Date.parse(charge.nextLookInAt);
  const left = Math.round((at - now) / 60_000);
  const when =
    left < 0 ? `${duration((now - at) / 1000, 'minute')} over` : `in ${duration((at - now) / 1000, 'minute')}`;
  return (
    <View style={styles.line}>
      <Txt tone={left < 0 ? 'ink' : 'ink2'} bold={left < 0} style={styles.words}>
        {`Look-in ${moment(at, zone, now, marks)}, ${when}`}
      </Txt>
      <Button
        look="line"
        size="small"
        title="Looked in"
        onPress={onDone}
        busy={busy}
        disabled={disabled}
        describedBy={describedBy}
      />
    </View>
  );
}

/**
 * Since when the current is off, as reckoned or as somebody said; while it flows, the way to say that it is off
 * already.
 */
export function CurrentLine({
  charge,
  now,
  disabled,
  onOffAt,
}: {
  charge: ChargeDto;
  now: number;
  disabled: boolean;
  /** Asks since when. */
  onOffAt: () => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const channel = channelsOf(charge) || 'The resistor';
  if (isFlowing(charge) && !waitsForSwap(charge) && charge.stepIndex === charge.option.steps.length - 1)
    return (
      <View style={styles.line}>
        <Txt tone="ink2" style={styles.words}>
          {charge.finish === 'over-and-settle' ? 'It does not stop by itself.' : 'It tapers to the mark.'}
        </Txt>
        <Link
          title="off already"
          label={`${channel} is off already`}
          onPress={onOffAt}
          disabled={disabled}
          align="right"
        />
      </View>
    );
  if ((charge.stage !== 'resting' && charge.stage !== 'check-due') || charge.currentEndAt === null) return null;
  const at = Date.parse(charge.currentEndAt);
  const said = charge.nextHand === null;
  return (
    <View style={styles.line}>
      <Txt style={styles.words}>
        {`The current is off since ${moment(at, zone, now, marks)}${said ? '' : ' as reckoned'}.${isDueEarly(charge, now) ? '' : ` The rest takes at least ${duration(charge.minRestS, 'minute')}.`}`}
      </Txt>
      {charge.stage === 'resting' ? (
        <Link
          title="change"
          label="Change since when the current is off"
          onPress={onOffAt}
          disabled={disabled}
          align="right"
        />
      ) : null}
    </View>
  );
}

/** When it is to be clipped on, and the way to another time. */
export function ClipOnLine({
  charge,
  now,
  disabled,
  onChange,
}: {
  charge: ChargeDto;
  now: number;
  disabled: boolean;
  onChange: () => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  if (!isToCome(charge)) return null;
  const at = Date.parse(charge.clipOnAt);
  const late = now - at > 60_000;
  const channel = channelsOf(charge);
  const where = channel ? ` at ${channel}` : '';
  return (
    <View style={styles.line}>
      <Txt tone="ink2" style={styles.words}>
        {charge.stage === 'planned'
          ? `Planned for ${moment(at, zone, now, marks)}${where}, not queued yet.`
          : late
            ? `Clip-on was to be ${moment(at, zone, now, marks)}${where}: its finish moves with the clock.`
            : `Clip on ${moment(at, zone, now, marks)}${where}, in ${duration((at - now) / 1000, 'minute')}.`}
      </Txt>
      <Link
        title={charge.stage === 'planned' ? 'queue it' : 'change'}
        label={charge.stage === 'planned' ? 'Queue it for a clip-on time' : 'Change the clip-on time'}
        onPress={onChange}
        disabled={disabled}
        align="right"
      />
    </View>
  );
}

/**
 * Who has the charge, and the way to a colleague.
 *
 * @param mayHandOver one's own, nobody's, or by who gives out people
 */
export function WhoHasIt({
  charge,
  mayHandOver,
  disabled,
  onHandOver,
}: {
  charge: ChargeDto;
  mayHandOver: boolean;
  disabled: boolean;
  onHandOver: () => void;
}) {
  const styles = useStyles();
  const open = isUnderWay(charge) || isToCome(charge) || charge.stage === 'ready';
  if (!open) return charge.person ? <Txt tone="ink2">{`${charge.person.name} had it.`}</Txt> : null;
  return (
    <View style={styles.line}>
      <Txt tone="ink2" style={styles.words}>
        {charge.person
          ? `${charge.person.name} has it.${mayHandOver ? '' : ` ${firstName(charge.person.name)} or a foreman hands it over.`}`
          : 'Nobody has it yet.'}
      </Txt>
      {mayHandOver ? (
        <Link
          title="hand over"
          label="Hand the charge over to a colleague"
          onPress={onHandOver}
          disabled={disabled}
          align="right"
        />
      ) : null}
    </View>
  );
}

const useStyles = makeStyles(() => ({
  line: {
    flexDirection: 'row',
    justifyContent: 'space-between',
    alignItems: 'center',
    columnGap: 12,
    minHeight: 48,
  },
  words: { flex: 1 },
}));
