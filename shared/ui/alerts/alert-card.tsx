import { View } from 'react-native';
import type { AlertDto } from '@/shared/contract/alert';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { CardColumn } from '../charge/card-column';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Span, Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { Surface } from '../theme/surface';
import { radius, stroke } from '../theme/tokens';
import { lookOf, stepOf, titleOf, whose } from './alert-words';

/** An alert that is open: what was seen, what to check first, and who has it. */
export function AlertCard({
  alert,
  card,
  personId,
  now,
  lagLimitVolts,
  busy,
  offline,
  problem,
  onTake,
  onPass,
  onGo,
}: {
  alert: AlertDto;
  /** Its charge on the board; undefined: it is not there any more. */
  card: ChargeCardDto | undefined;
  personId: string;
  now: number;
  lagLimitVolts?: number;
  busy: boolean;
  /** Taking and passing need the connection. */
  offline: boolean;
  /** Why the last tap was refused: somebody else has it. */
  problem: string | null;
  onTake: () => void;
  onPass: () => void;
  onGo: (path: string) => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const { mark, word } = lookOf(alert);
  const step = stepOf(alert, card);
  const mine = alert.takenBy?.id === personId;
  const noteId = `alert-${alert.id}`;
  const inside = (
    <>
      <View style={styles.head}>
        <StageTag stage={mark} text={word} />
        <Txt kind="small" nowrap>
          {`${moment(Date.parse(alert.raisedAt), zone, now, marks)} · ${whose(alert, personId)}`}
        </Txt>
      </View>
      <View style={styles.middle}>
        <View style={styles.words}>
          <Txt kind="numM" heading={2}>
            {titleOf(alert)}
          </Txt>
          <Txt>{alert.seen}</Txt>
        </View>
        {card ? <CardColumn card={card} lagLimitVolts={lagLimitVolts} /> : null}
      </View>
      {alert.checkFirst ? (
        <Txt style={styles.check}>
          <Span bold>Check first:</Span> {alert.checkFirst.charAt(0).toLowerCase() + alert.checkFirst.slice(1)}
        </Txt>
      ) : null}
      {problem || offline ? (
        <View nativeID={noteId}>
          <Txt
            kind={problem ? 'label' : 'small'}
            tone={problem ? 'alarm' : 'ink2'}
            role={problem ? 'alert' : undefined}
          >
            {problem ?? 'Taking it and passing it on need the connection.'}
          </Txt>
        </View>
      ) : null}
      <View style={styles.acts}>
        {alert.takenBy ? (
          <Button
            look={mine ? 'primary' : 'line'}
            title={step.title}
            label={`${step.title}, ${alert.title}`}
            onPress={() => onGo(step.path)}
            grow
          />
        ) : (
          <Button
            title="I have it"
            label={`I have it: ${alert.title}`}
            onPress={onTake}
            busy={busy}
            disabled={offline}
            describedBy={offline ? noteId : undefined}
            grow
          />
        )}
        <Button
          look="line"
          title="Pass on"
          label={`Pass ${alert.title} on to a colleague`}
          onPress={onPass}
          disabled={offline}
          describedBy={offline ? noteId : undefined}
        />
      </View>
    </>
  );
  const label = `${word}, ${titleOf(alert)}`;
  if (alert.level === 'tell')
    return (
      <Surface tone="sheet" role="region" aria-label={label} style={styles.told}>
        {inside}
      </Surface>
    );
  return (
    <CallOut tone={alert.level === 'alarm' ? 'red' : 'amber'} label={label}>
      {inside}
    </CallOut>
  );
}

const useStyles = makeStyles((theme) => ({
  told: { borderRadius: radius.sheet, padding: 14, ...innerFrame(theme, stroke.control, theme.colors.edge) },
  head: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', columnGap: 12 },
  middle: { flexDirection: 'row', justifyContent: 'space-between', columnGap: 12, marginTop: 8 },
  words: { flex: 1, minWidth: 0, rowGap: 4 },
  check: { marginTop: 8 },
  acts: { flexDirection: 'row', columnGap: 8, marginTop: 12 },
}));
