import { useMemo, useRef, useState } from 'react';
import { View } from 'react-native';
import type { BenchPlanDto, MovePlacesDto } from '@/shared/contract/bench-plan';
import type { CardClock } from '../charge/card-model';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import type { WebKeyEvent } from '../theme/web-props';
import { ChannelLane } from './channel-lane';
import type { Candidate, Ghost } from './move-candidate';
import { PersonLane } from './person-lane';
import { dayAxis, nowX, type PlanAxis } from './plan-axis';
import { PlanAxisHead } from './plan-axis-head';
import { NowLine } from './now-line';
import { PlanLegend } from './plan-legend';
import { useLaneDrag } from './use-lane-drag';

/** Room of the names left of the axis, px; on a narrow picture less of it. */
const nameWidths = { wide: 112, narrow: 84 } as const;
const narrowUnder = 800;

export interface PictureActs {
  onPick: (chargeId: string) => void;
  /** A key on a charge of the time line: arrows, Enter, Escape. */
  onKey: (chargeId: string, event: WebKeyEvent) => void;
  onDrag: (chargeId: string, candidate: Candidate) => void;
  onDrop: (chargeId: string, candidate: Candidate) => void;
  onCancel: () => void;
  onFree: (personId: string) => void;
}

/** The day on one time line: a lane per channel, a lane per person, and one line through all of them where now is. */
export function PlanPicture({
  plan,
  at,
  stale,
  picked,
  places,
  ghost,
  acts,
}: {
  plan: BenchPlanDto;
  at: CardClock;
  stale: boolean;
  picked: string | null;
  /** Where the picked charge could go. */
  places: MovePlacesDto | null;
  ghost: Ghost | null;
  acts: PictureActs;
}) {
  const styles = useStyles();
  const [width, setWidth] = useState(0);
  const nameWidth = width < narrowUnder ? nameWidths.narrow : nameWidths.wide;
  const { from, to } = dayAxis(plan, at.now);
  const axis = useMemo<PlanAxis>(
    () => ({ from, to, width: Math.max(120, width - nameWidth) }),
    [from, to, width, nameWidth],
  );
  const lanes = useRef(new Map<string, View | null>());
  const drag = useLaneDrag({ lanes, msPerPx: (to - from) / axis.width, ...acts });
  const line = nowX(axis, at.now);
  return (
    <View onLayout={({ nativeEvent }) => setWidth(Math.floor(nativeEvent.layout.width))} style={styles.picture}>
      {width === 0 ? null : (
        <>
          <View style={{ marginLeft: nameWidth }}>
            <PlanAxisHead axis={axis} now={at.now} stale={stale} />
          </View>
          <View role="group" aria-label="Channels" style={styles.channels}>
            {plan.channels.map((channel) => (
              <ChannelLane
                key={channel.id}
                ref={(lane) => void lanes.current.set(channel.id, lane)}
                plan={plan}
                channel={channel}
                axis={axis}
                at={at}
                nameWidth={nameWidth}
                stale={stale}
                place={picked === null ? null : (places?.places.find((one) => one.channelId === channel.id) ?? null)}
                ghost={ghost?.candidate.channelId === channel.id ? ghost : null}
                acts={{ picked, onPick: acts.onPick, onKey: acts.onKey, drag }}
              />
            ))}
          </View>
          <View role="group" aria-label="People" style={styles.people}>
            <View style={[styles.behind, { left: nameWidth }]}>
              <NowLine x={line} stale={stale} />
            </View>
            <PlanLegend nameWidth={nameWidth} />
            {plan.people.length === 0 ? (
              <Txt tone="ink2" style={styles.nobody}>
                Nobody has hours on this day.
              </Txt>
            ) : (
              plan.people.map((person) => (
                <PersonLane
                  key={person.person.id}
                  person={person}
                  axis={axis}
                  now={at.now}
                  nameWidth={nameWidth}
                  onFree={() => acts.onFree(person.person.id)}
                />
              ))
            )}
          </View>
        </>
      )}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  picture: { minHeight: 240, width: '100%' },
  channels: {},
  people: { borderTopWidth: 1.5, borderTopColor: colors.edge },
  // Docks stand before the line of now.
  behind: { position: 'absolute', top: 0, bottom: 0 },
  nobody: { paddingVertical: 16 },
}));
