import { View } from 'react-native';
import type { BenchPlanDto, PlanChannelDto } from '@/shared/contract/bench-plan';
import { firstName, stageOf, stageWords } from '../charge/card-model';
import { dayName, moment } from '../format/clock';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { stages } from '../stage/stages';
import { makeStyles } from '../theme/make-styles';
import { useTheme } from '../theme/theme';
import { radius } from '../theme/tokens';
import { web } from '../theme/web-props';
import { personDay, weekBars, weekDays, weekHours, type WeekDay } from './week-layout';

/** Seven days side by side: which charge has which channel, and how much of each person's day is spoken for. */
export function WeekPicture({
  plan,
  today,
  now,
  nameWidth = 112,
  onDay,
  onGo,
}: {
  plan: BenchPlanDto;
  today: string;
  now: number;
  nameWidth?: number;
  onDay: (day: string) => void;
  onGo: (path: string) => void;
}) {
  const styles = useStyles();
  const days = weekDays(plan);
  return (
    <View {...web({ role: 'table', 'aria-label': 'Seven days' })}>
      <View style={styles.row} {...web({ role: 'row' })}>
        <View style={{ width: nameWidth }} {...web({ role: 'columnheader', 'aria-label': 'Channel or person' })} />
        {days.map((day) => (
          <View
            key={day.day}
            style={[styles.cell, styles.headCell, day.day === today && styles.today]}
            {...web({ role: 'columnheader' })}
          >
            <Link
              kind="label"
              title={dayName(day.day, today)}
              label={`Show ${dayName(day.day, today)}`}
              onPress={() => onDay(day.day)}
            />
          </View>
        ))}
      </View>
      {plan.channels.map((channel) => (
        <ChannelWeek key={channel.id} {...{ plan, channel, days, today, now, nameWidth, onGo }} />
      ))}
      <PeopleWeek plan={plan} days={days} nameWidth={nameWidth} today={today} />
    </View>
  );
}

function ChannelWeek({
  plan,
  channel,
  days,
  today,
  now,
  nameWidth,
  onGo,
}: {
  plan: BenchPlanDto;
  channel: PlanChannelDto;
  days: readonly WeekDay[];
  today: string;
  now: number;
  nameWidth: number;
  onGo: (path: string) => void;
}) {
  const styles = useStyles();
  const { colors } = useTheme();
  const { zone, marks } = useFormats();
  const hours = weekHours(plan, days);
  return (
    <View style={styles.row} {...web({ role: 'row' })}>
      <View style={[styles.name, { width: nameWidth }]} {...web({ role: 'rowheader' })}>
        <Txt kind="numS">{channel.name}</Txt>
        <Txt kind="small" tone="ink2">
          {channel.kind}
        </Txt>
      </View>
      {days.map((day) => {
        const bars = weekBars(plan.charges, channel.id, day, hours);
        const live = now >= day.from && now < day.to;
        const share = (now - day.from - hours.from * 3_600_000) / ((hours.to - hours.from) * 3_600_000);
        return (
          <View
            key={day.day}
            style={[styles.cell, !day.open && styles.closed, day.day === today && styles.today]}
            {...web({ role: 'cell' })}
          >
            <View style={styles.strip} aria-hidden>
              {bars.map(({ charge, left, right }) => {
                const { color } = stages[stageOf(charge.card)];
                const begun = charge.card.startedAt !== null;
                return (
                  <View
                    key={charge.card.id}
                    style={[
                      styles.bar,
                      {
                        left: `${left * 100}%`,
                        width: `${Math.max(2, (right - left) * 100)}%`,
                        borderColor: colors[begun ? color : 'charging'],
                        backgroundColor: begun ? colors[color] : colors.chargingTint,
                      },
                    ]}
                  />
                );
              })}
              {live && share >= 0 && share <= 1 ? <View style={[styles.now, { left: `${share * 100}%` }]} /> : null}
            </View>
            {bars.map(({ charge, before, after }) => (
              <Link
                key={charge.card.id}
                kind="small"
                tight={false}
                title={`${before ? '… ' : ''}${charge.card.title}${after ? ' …' : ''}`}
                label={`${charge.card.title} on ${channel.name}, ${stageWords(charge.card).toLowerCase()}, clip on ${moment(Date.parse(charge.card.clipOnAt), zone, now, marks)}`}
                href={`/charges/${charge.card.id}`}
                onPress={() => onGo(`/charges/${charge.card.id}`)}
              />
            ))}
          </View>
        );
      })}
    </View>
  );
}

function PeopleWeek({
  plan,
  days,
  nameWidth,
  today,
}: {
  plan: BenchPlanDto;
  days: readonly WeekDay[];
  nameWidth: number;
  today: string;
}) {
  const styles = useStyles();
  return (
    <>
      {plan.people.map((person) => (
        <View key={person.person.id} style={styles.row} {...web({ role: 'row' })}>
          <View style={[styles.name, { width: nameWidth }]} {...web({ role: 'rowheader' })}>
            <Txt bold numberOfLines={1}>
              {firstName(person.person.name)}
            </Txt>
          </View>
          {days.map((day) => {
            const { there, busy, off } = personDay(person, day);
            return (
              <View
                key={day.day}
                style={[styles.cell, styles.person, !day.open && styles.closed, day.day === today && styles.today]}
                {...web({ role: 'cell' })}
              >
                {there === 0 ? (
                  <Txt kind="small" tone="ink2" numberOfLines={2}>
                    {off ?? 'not in'}
                  </Txt>
                ) : (
                  <>
                    <Txt kind="small" nowrap>{`${duration(there * 60, 'minute')} in`}</Txt>
                    <Txt kind="small" tone="ink2" nowrap>
                      {busy === 0 ? 'nothing yet' : `${duration(busy * 60, 'minute')} taken`}
                    </Txt>
                  </>
                )}
              </View>
            );
          })}
        </View>
      ))}
    </>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: { flexDirection: 'row', alignItems: 'stretch', borderTopWidth: 1, borderTopColor: colors.line },
  name: { flexShrink: 0, paddingRight: 8, paddingVertical: 10 },
  cell: {
    flex: 1,
    minWidth: 0,
    minHeight: 56,
    paddingHorizontal: 6,
    paddingVertical: 8,
    borderLeftWidth: 1,
    borderLeftColor: colors.line,
  },
  headCell: { minHeight: 48, paddingVertical: 0 },
  person: { justifyContent: 'center' },
  closed: { backgroundColor: colors.heldTint },
  today: { backgroundColor: colors.sheet },
  strip: { height: 22, marginHorizontal: -6, overflow: 'hidden' },
  bar: { position: 'absolute', top: 3, height: 16, borderWidth: 1.5, borderRadius: radius.mark },
  now: { position: 'absolute', top: 0, bottom: 0, width: 2.5, backgroundColor: colors.ink },
}));
