import { useMemo, type Ref } from 'react';
import { View } from 'react-native';
import type { BenchPlanDto, MovePlaceDto, PlanChannelDto } from '@/shared/contract/bench-plan';
import type { CardClock } from '../charge/card-model';
import { useFormats } from '../format/formats';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import type { WebKeyEvent } from '../theme/web-props';
import { chargeTag, latenessWords } from './charge-words';
import { LaneCharge, rowHeight } from './lane-charge';
import { labelWidth, placeLabels } from './lane-labels';
import { lanePieces, packRows, queueDots, type LanePiece } from './lane-pieces';
import type { Ghost } from './move-candidate';
import { MoveGhost } from './move-ghost';
import { NowLine } from './now-line';
import { nowX, toX, type PlanAxis } from './plan-axis';
import type { LaneDrag } from './use-lane-drag';
import { moment } from '../format/clock';

export interface LaneActs {
  picked: string | null;
  onPick: (chargeId: string) => void;
  onKey: (chargeId: string, event: WebKeyEvent) => void;
  drag: LaneDrag;
}

/** The lane of a channel: its name, its charges on the axis, and where the picked one may go. */
export function ChannelLane({
  plan,
  channel,
  axis,
  at,
  nameWidth,
  place,
  ghost,
  acts,
  stale,
  ref,
}: {
  plan: BenchPlanDto;
  channel: PlanChannelDto;
  axis: PlanAxis;
  at: CardClock;
  nameWidth: number;
  /** Where the picked charge could go on this channel; null: none is picked, or it is not known yet. */
  place: MovePlaceDto | null;
  ghost: Ghost | null;
  acts: LaneActs;
  stale: boolean;
  ref?: Ref<View>;
}) {
  const styles = useStyles();
  const formats = useFormats();
  const rows = useMemo(() => {
    const pieces = lanePieces(plan, channel.id, at, axis.from).filter(
      (piece) => piece.to > axis.from && piece.from < axis.to,
    );
    return packRows(pieces, (piece) => extentOf(piece, axis));
  }, [plan, channel.id, at, axis]);
  const height = Math.max(1, rows.length) * rowHeight;
  const line = nowX(axis, at.now);
  return (
    <View ref={ref} style={styles.lane}>
      <View style={[styles.name, { width: nameWidth }]}>
        <View style={styles.names}>
          <Txt kind="numM" heading={3}>
            {channel.name}
          </Txt>
          {place?.soonest ? (
            <Txt
              kind="small"
              bold={place.soonest.lateByMinutes > 0}
              tone={place.soonest.lateByMinutes > 0 ? 'alarm' : 'ink2'}
            >
              {latenessWords(place.soonest.lateByMinutes)}
            </Txt>
          ) : place ? null : (
            <Txt kind="small" tone="ink2">
              {channel.kind}
            </Txt>
          )}
        </View>
        {place ? <PlaceNote place={place} now={at.now} /> : null}
      </View>
      <View
        role={rows.length > 0 ? 'list' : undefined}
        aria-label={rows.length > 0 ? `Charges on ${channel.name}` : undefined}
        style={[styles.room, { width: axis.width, height }]}
      >
        <NowLine x={line} stale={stale} />
        {rows.map((row, index) => (
          <LaneRow
            key={row[0]?.charge.card.id ?? index}
            row={row}
            top={index * rowHeight}
            {...{ plan, channel, axis, at, acts, stale, formats, line }}
          />
        ))}
        {ghost ? <MoveGhost ghost={ghost} axis={axis} /> : null}
      </View>
    </View>
  );
}

/** From the silhouette to its end, at least as wide as its name. */
function extentOf(piece: LanePiece, axis: PlanAxis): { left: number; right: number } {
  const name = labelWidth(piece.charge.card.title, null) + 12;
  const left = Math.max(0, Math.min(toX(axis, piece.from), axis.width - name));
  return { left, right: Math.max(toX(axis, piece.to) + 4, left + name) };
}

function LaneRow({
  row,
  top,
  plan,
  channel,
  axis,
  at,
  acts,
  stale,
  formats,
  line,
}: {
  row: readonly LanePiece[];
  top: number;
  plan: BenchPlanDto;
  channel: PlanChannelDto;
  axis: PlanAxis;
  at: CardClock;
  acts: LaneActs;
  stale: boolean;
  formats: ReturnType<typeof useFormats>;
  line: number | null;
}) {
  const styles = useStyles();
  const spanS = (axis.to - axis.from) / 1000;
  const pegX = (s: number) => (s / spanS) * axis.width;
  const tags = row.map(({ charge }) =>
    chargeTag(
      charge,
      plan.queue.find(({ chargeId }) => chargeId === charge.card.id),
      at.now,
      formats,
    ),
  );
  const pegs = row.map(({ lookIns }) => lookIns.filter(({ s }) => s >= 0 && s <= spanS));
  const { labels, hidden } = placeLabels(
    row.map(({ charge, from }, index) => ({
      x: toX(axis, from),
      title: charge.card.title,
      tag: tags[index]?.text ?? null,
      needed: tags[index] !== null && tags[index]?.tone !== 'plain',
    })),
    pegs.flat().map(({ s }) => pegX(s)),
    axis.width,
    pegs.flatMap((list) => list.filter(({ state }) => state === 'done').map(({ s }) => pegX(s))),
  );
  return (
    <View style={[styles.row, { top, width: axis.width }]}>
      <NowLine x={line} stale={stale} />
      {row.map((piece, index) => {
        const label = labels[index];
        const { id } = piece.charge.card;
        return label ? (
          <LaneCharge
            key={`${id}-${index}`}
            piece={piece}
            dots={queueDots(row, index, axis.from)}
            channelName={channel.name}
            axis={axis}
            at={at}
            label={label}
            tag={tags[index] ?? null}
            pegs={(pegs[index] ?? []).filter(({ s }) => !hidden.includes(pegX(s)))}
            picked={acts.picked === id}
            dim={stale}
            drag={acts.drag}
            onPick={() => acts.onPick(id)}
            onKey={(event) => acts.onKey(id, event)}
          />
        ) : null;
      })}
    </View>
  );
}

/** Under the channel's name while a charge is picked: the soonest it could begin there, or why it cannot. */
function PlaceNote({ place, now }: { place: MovePlaceDto; now: number }) {
  const formats = useFormats();
  const { soonest } = place;
  if (!soonest)
    return (
      <Txt kind="small" tone="ink2" numberOfLines={2}>
        {place.because ?? 'No place here.'}
      </Txt>
    );
  const at = (instant: string) => moment(Date.parse(instant), formats.zone, now, formats.marks);
  return (
    <>
      <Txt kind="small" numberOfLines={1}>{`from ${at(soonest.clipOnAt)}`}</Txt>
      <Txt kind="small" tone="ink2" numberOfLines={1}>{`ready ${at(soonest.ready.likely)}`}</Txt>
    </>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  lane: { flexDirection: 'row', alignItems: 'center', borderTopWidth: 1, borderTopColor: colors.line },
  name: { flexShrink: 0 },
  names: { flexDirection: 'row', alignItems: 'baseline', flexWrap: 'wrap', columnGap: 5 },
  // What runs beyond the day is cut at the ends of the axis.
  room: { overflow: 'hidden' },
  row: { position: 'absolute', left: 0, height: rowHeight },
}));
