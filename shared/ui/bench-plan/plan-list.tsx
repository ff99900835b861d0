import { Pressable, View } from 'react-native';
import type { BenchPlanDto, PlanChannelDto, PlanPersonDto } from '@/shared/contract/bench-plan';
import { firstName, isToCome, stageWords, type CardClock } from '../charge/card-model';
import { CardRibbon } from '../charge/card-ribbon';
import { clock, moment, readyWithBand } from '../format/clock';
import { useFormats } from '../format/formats';
import { EN_DASH } from '../format/marks';
import { Rule } from '../primitives/rule';
import { Txt } from '../primitives/txt';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { stroke, touch } from '../theme/tokens';
import { web } from '../theme/web-props';
import { chargeTag, freeWords as channelFree } from './charge-words';
import { dayAxis } from './plan-axis';
import { lanePieces, type LanePiece } from './lane-pieces';
import { absence, blockWords, freeWords, personPegs } from './person-pieces';

/** The day on a narrow screen: a list by channel, then by person; what the time line shows, in words. */
export function PlanList({
  plan,
  at,
  stale,
  picked,
  onPick,
  onFree,
}: {
  plan: BenchPlanDto;
  at: CardClock;
  stale: boolean;
  picked: string | null;
  onPick: (chargeId: string) => void;
  onFree: (personId: string) => void;
}) {
  const styles = useStyles();
  const axis = dayAxis(plan, at.now);
  return (
    <View style={styles.stack}>
      <View role="group" aria-label="Channels">
        {plan.channels.map((channel) => (
          <ChannelPart key={channel.id} {...{ plan, axis, channel, at, stale, picked, onPick }} />
        ))}
      </View>
      <View role="group" aria-label="People">
        <Txt kind="heading" heading={2} style={styles.people}>
          People
        </Txt>
        {plan.people.length === 0 ? <Txt tone="ink2">Nobody has hours on this day.</Txt> : null}
        {plan.people.map((person) => (
          <PersonPart key={person.person.id} person={person} now={at.now} onFree={() => onFree(person.person.id)} />
        ))}
      </View>
    </View>
  );
}

function ChannelPart({
  plan,
  axis,
  channel,
  at,
  stale,
  picked,
  onPick,
}: {
  plan: BenchPlanDto;
  /** One axis for all silhouettes of the day. */
  axis: { from: number; to: number };
  channel: PlanChannelDto;
  at: CardClock;
  stale: boolean;
  picked: string | null;
  onPick: (chargeId: string) => void;
}) {
  const styles = useStyles();
  const formats = useFormats();
  const [from, to] = [Date.parse(plan.from), Date.parse(plan.to)];
  const pieces = lanePieces(plan, channel.id, at, from).filter((piece) => piece.to > from && piece.from < to);
  return (
    <View style={styles.channel}>
      <View style={styles.head}>
        <View style={styles.names}>
          <Txt kind="numM" heading={2}>
            {channel.name}
          </Txt>
          <Txt kind="small" tone="ink2">
            {channel.kind}
          </Txt>
        </View>
        <Txt kind="small" tone="ink2" nowrap>
          {channel.freeAt === null ? '' : `free ${channelFree(channel.freeAt, at.now, formats)}`}
        </Txt>
      </View>
      {pieces.length === 0 ? (
        <Txt kind="small" tone="ink2">
          Nothing on this day.
        </Txt>
      ) : (
        <View role="list" aria-label={`Charges on ${channel.name}`}>
          {pieces.map((piece, index) => (
            <PieceRow
              key={`${piece.charge.card.id}-${index}`}
              {...{ plan, axis, piece, at, stale }}
              channelName={channel.name}
              picked={picked === piece.charge.card.id}
              onPick={() => onPick(piece.charge.card.id)}
            />
          ))}
        </View>
      )}
    </View>
  );
}

function PieceRow({
  plan,
  axis,
  piece,
  channelName,
  at,
  stale,
  picked,
  onPick,
}: {
  plan: BenchPlanDto;
  axis: { from: number; to: number };
  piece: LanePiece;
  channelName: string;
  at: CardClock;
  stale: boolean;
  picked: boolean;
  onPick: () => void;
}) {
  const styles = useStyles();
  const formats = useFormats();
  const { zone, marks } = formats;
  const { card, fixedBecause } = piece.charge;
  const queued = plan.queue.find(({ chargeId }) => chargeId === card.id);
  const tag = chargeTag(piece.charge, queued, at.now, formats);
  const when = (instant: number) => moment(instant, zone, at.now, marks);
  const time = isToCome(card) ? `clip on ${when(piece.from)}` : `since ${when(piece.from)}`;
  const zero = Date.parse(plan.from);
  const ready = piece.band
    ? readyWithBand(
        {
          p10: zero + piece.band.p10 * 1000,
          p50: zero + piece.band.p50 * 1000,
          p90: zero + piece.band.p90 * 1000,
        },
        zone,
        at.now,
        marks,
      )
    : null;
  const state = tag?.text ?? stageWords(card).toLowerCase();
  return (
    <View role="listitem">
      <Pressable
        role="button"
        aria-pressed={picked}
        aria-label={[
          `${fixedBecause === null ? 'Move ' : ''}${card.title} on ${channelName}`,
          stageWords(card).toLowerCase(),
          ...(tag ? [tag.text] : []),
          time,
          ...(ready ? [ready] : []),
        ].join(', ')}
        onPress={onPick}
        {...web({ dataSet: { press: '', charge: card.id } })}
        style={({ pressed }) => [styles.row, pressed && styles.pressed, picked && styles.picked]}
      >
        <View style={styles.head}>
          <View style={styles.names}>
            <Txt kind="numS">{card.title}</Txt>
            <Txt
              kind="small"
              bold={tag !== null && tag.tone !== 'plain'}
              tone={tag?.tone === 'alarm' ? 'alarm' : 'ink2'}
            >
              {state}
            </Txt>
          </View>
          <Txt kind="small" tone={stale ? 'ink3' : 'ink2'} nowrap>
            {[time, ready].filter(Boolean).join(', ')}
          </Txt>
        </View>
        <View aria-hidden style={styles.ribbon}>
          <CardRibbon card={card} at={at} height={30} axis={false} stale={stale} shared={axis} />
        </View>
      </Pressable>
    </View>
  );
}

function PersonPart({ person, now, onFree }: { person: PlanPersonDto; now: number; onFree: () => void }) {
  const styles = useStyles();
  const formats = useFormats();
  const away = absence(person);
  const nothing = person.blocks.length === 0 && person.free.length === 0 && person.lookIns.length === 0;
  const rows = [
    ...person.blocks.map((block) => ({
      at: block.from,
      words: blockWords(block, formats),
      free: false,
      over: block.to,
    })),
    ...person.free.map((free) => ({ at: free.from, words: freeWords(free, formats), free: true, over: free.to })),
    ...personPegs(person.lookIns, { from: 0, to: 1, width: 1 }, now, formats).map((peg) => ({
      at: new Date(peg.s * 1000).toISOString(),
      words: peg.label,
      free: false,
      over: new Date(peg.s * 1000).toISOString(),
    })),
  ].sort((a, b) => Date.parse(a.at) - Date.parse(b.at));
  return (
    <View style={styles.person}>
      <View style={styles.head}>
        <Txt bold heading={3}>
          {firstName(person.person.name)}
        </Txt>
        <Txt kind="small" tone="ink2">
          {away ?? person.present.map(({ from, to }) => hours(from, to, formats)).join(', ')}
        </Txt>
      </View>
      {nothing && away === null ? (
        <Txt kind="small" tone="ink2">
          Nothing on this day.
        </Txt>
      ) : null}
      <View
        role={rows.length > 0 ? 'list' : undefined}
        aria-label={rows.length > 0 ? `What ${firstName(person.person.name)} does` : undefined}
      >
        {rows.map((row, index) => (
          <View key={index} role="listitem">
            {row.free && Date.parse(row.over) > now ? (
              <Pressable role="button" onPress={onFree} style={styles.free}>
                <Txt kind="small" style={styles.underlined}>
                  {row.words}
                </Txt>
              </Pressable>
            ) : (
              <Txt kind="small" tone={Date.parse(row.over) < now ? 'ink3' : 'ink'} style={styles.block}>
                {row.words}
              </Txt>
            )}
          </View>
        ))}
      </View>
      <Rule gap={0} />
    </View>
  );
}

const hours = (from: string, to: string, { zone, marks }: ReturnType<typeof useFormats>) =>
  `${clock(Date.parse(from), zone, marks)}${EN_DASH}${clock(Date.parse(to), zone, marks)}`;

const useStyles = makeStyles((theme) => ({
  stack: { rowGap: 16 },
  channel: { borderTopWidth: 1, borderTopColor: theme.colors.line, paddingVertical: 10, rowGap: 4 },
  head: {
    flexDirection: 'row',
    justifyContent: 'space-between',
    alignItems: 'baseline',
    columnGap: 10,
    flexWrap: 'wrap',
  },
  names: { flexDirection: 'row', alignItems: 'baseline', columnGap: 6, flexShrink: 1, flexWrap: 'wrap' },
  row: { minHeight: touch.min, paddingVertical: 8, paddingHorizontal: 8, marginHorizontal: -8, rowGap: 2 },
  pressed: { backgroundColor: theme.colors.well },
  picked: { backgroundColor: theme.colors.sheet, ...innerFrame(theme, stroke.chosen, theme.colors.ink) },
  ribbon: { marginTop: 2 },
  people: { marginBottom: 8 },
  person: { rowGap: 2, paddingBottom: 2, paddingTop: 8 },
  free: { minHeight: touch.min, justifyContent: 'center' },
  underlined: { textDecorationLine: 'underline' },
  block: { paddingVertical: 3 },
}));
