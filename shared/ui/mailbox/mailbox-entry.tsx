import { useState } from 'react';
import { View } from 'react-native';
import type { SentWay } from '@/shared/contract/alert-settings';
import type { MailboxEntryDto } from '@/shared/contract/mailbox';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Link } from '../primitives/link';
import { SegmentSwitch } from '../primitives/segment-switch';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { makeStyles } from '../theme/make-styles';
import { radius, stroke } from '../theme/tokens';
import { MailFrame } from './mail-frame';

const wayWords: Record<SentWay, string> = {
  'e-mail': 'E-mail',
  'browser-push': 'Push to a browser',
  'phone-push': 'Push to a phone',
};

/** One message as it was sent: to whom, when, for which alert, and what stood in it. */
export function MailboxEntry({ entry, now }: { entry: MailboxEntryDto; now: number }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const [open, setOpen] = useState(false);
  const [as, setAs] = useState<'html' | 'text'>('html');
  const { number, way, to, title, text, html, at, alertId, turn, again } = entry;
  const who = to.name ?? 'somebody who is gone';
  return (
    <View role="listitem" style={styles.entry}>
      <View style={styles.head}>
        <Txt bold style={styles.words}>
          {title}
        </Txt>
        <Txt kind="numS" nowrap>
          {moment(Date.parse(at), zone, now, marks)}
        </Txt>
      </View>
      {again ? (
        <View>
          <StageTag stage="held" text="came again: receivers show it once" />
        </View>
      ) : null}
      <View style={styles.foot}>
        <Txt kind="small" tone="ink2" style={styles.words}>
          {`${wayWords[way]} to ${who}`}
        </Txt>
        <Link
          kind="small"
          align="right"
          title={open ? 'close' : 'read it'}
          label={`${open ? 'Close' : 'Read'} number ${number}: ${title}, to ${who}`}
          onPress={() => setOpen(!open)}
        />
      </View>
      {open ? (
        <View style={styles.letter}>
          {html === null ? null : (
            <SegmentSwitch
              label="Show the letter as"
              value={as}
              style={styles.switch}
              segments={[
                { value: 'html', label: 'HTML' },
                { value: 'text', label: 'Text' },
              ]}
              onChange={setAs}
            />
          )}
          <View style={styles.paper}>
            {html !== null && as === 'html' ? (
              <MailFrame html={html} title={`Letter: ${title}`} />
            ) : (
              <Txt style={styles.plain}>{text.trim()}</Txt>
            )}
          </View>
          <Txt kind="small" tone="ink2" style={styles.long}>
            {`To ${to.address}.${alertId === null ? '' : ` Alert ${alertId}, turn ${turn}.`}`}
          </Txt>
        </View>
      ) : null}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  entry: { borderTopWidth: 1, borderTopColor: colors.line, paddingTop: 10 },
  head: { flexDirection: 'row', alignItems: 'baseline', columnGap: 12 },
  foot: { flexDirection: 'row', alignItems: 'center', columnGap: 12 },
  words: { flex: 1, minWidth: 0 },
  switch: { alignSelf: 'flex-start', width: 220 },
  letter: { rowGap: 10, paddingBottom: 16 },
  paper: {
    backgroundColor: colors.sheet,
    borderRadius: radius.control,
    borderWidth: stroke.control,
    borderColor: colors.edge,
    overflow: 'hidden',
  },
  plain: { padding: 14, overflowWrap: 'anywhere' } as object,
  long: { overflowWrap: 'anywhere' } as object,
}));
