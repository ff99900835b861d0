import { View } from 'react-native';
import type { BenchPlanDto } from '@/shared/contract/bench-plan';
import { firstName, stageWords } from '../charge/card-model';
import { dayName, moment } from '../format/clock';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { personDay, weekBars, weekDays, weekHours } from './week-layout';

/** Seven days on a narrow screen: per day the charges of each channel, and who is there. */
export function WeekList({
  plan,
  today,
  now,
  onDay,
  onGo,
}: {
  plan: BenchPlanDto;
  today: string;
  now: number;
  onDay: (day: string) => void;
  onGo: (path: string) => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const days = weekDays(plan);
  const hours = weekHours(plan, days);
  return (
    <View role="list" aria-label="Seven days">
      {days.map((day) => {
        const charges = plan.channels.flatMap((channel) =>
          weekBars(plan.charges, channel.id, day, hours).map((bar) => ({ channel, ...bar })),
        );
        const there = plan.people.map((person) => ({ person, ...personDay(person, day) }));
        const present = there.filter((one) => one.there > 0);
        return (
          <View key={day.day} role="listitem" style={styles.day}>
            <Link
              title={dayName(day.day, today)}
              label={`Show ${dayName(day.day, today)}`}
              onPress={() => onDay(day.day)}
            />
            {charges.length === 0 ? (
              <Txt kind="small" tone="ink2">
                {day.open ? 'No charge.' : 'Closed, no charge.'}
              </Txt>
            ) : (
              charges.map(({ channel, charge, before, after }) => (
                <View key={`${channel.id}-${charge.card.id}`} style={styles.row}>
                  <Link
                    kind="label"
                    title={charge.card.title}
                    href={`/charges/${charge.card.id}`}
                    onPress={() => onGo(`/charges/${charge.card.id}`)}
                  />
                  <Txt kind="small" tone="ink2" style={styles.words}>
                    {[
                      channel.name,
                      stageWords(charge.card).toLowerCase(),
                      before ? 'since the day before' : moment(Date.parse(charge.card.clipOnAt), zone, now, marks),
                      ...(after ? ['into the next day'] : []),
                    ].join(', ')}
                  </Txt>
                </View>
              ))
            )}
            <Txt kind="small" tone="ink2">
              {present.length === 0
                ? 'Nobody is in.'
                : present
                    .map(({ person, busy }) =>
                      [firstName(person.person.name), busy > 0 ? `${duration(busy * 60, 'minute')} taken` : null]
                        .filter(Boolean)
                        .join(' '),
                    )
                    .join(', ')}
            </Txt>
          </View>
        );
      })}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  day: { borderTopWidth: 1, borderTopColor: colors.line, paddingBottom: 10 },
  row: { flexDirection: 'row', alignItems: 'center', columnGap: 10 },
  words: { flex: 1, minWidth: 0 },
}));
