import { View } from 'react-native';
import type { WorkDto } from '@/shared/contract/work';
import { workPriorityNames } from '@/shared/contract/work-terms';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { PressableLink } from '../primitives/pressable-link';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { useBreakpoint } from '../theme/use-breakpoint';
import { WorkName } from './work-name';
import { asksFor, isWorkLate, leftWords, whoHasIt, workMinutes, workTitle } from './work-words';

export interface WorkShown {
  work: readonly WorkDto[];
  now: number;
  onOpen: (id: string) => void;
}

/** What a reader hears of a row. */
const rowLabel = (work: WorkDto, due: string): string =>
  [workTitle(work), leftWords(work), asksFor(work), due, whoHasIt(work)].filter(Boolean).join(', ');

/** Pieces of other work: a table on the desk, rows elsewhere. The whole row opens it. */
export function WorkRows(props: WorkShown) {
  return useBreakpoint() === 'wide' ? <WorkTable {...props} /> : <WorkList {...props} />;
}

function WorkTable({ work, now, onOpen }: WorkShown) {
  const { zone, marks } = useFormats();
  const due = (one: WorkDto) => (one.dueAt ? moment(Date.parse(one.dueAt), zone, now, marks) : '');
  return (
    <Table
      label="Other work"
      rows={work}
      rowKey={({ id }) => id}
      rowHeight={52}
      onOpen={({ id }) => onOpen(id)}
      rowLabel={(one) => rowLabel(one, one.dueAt ? `due ${due(one)}` : '')}
      columns={[
        {
          key: 'title',
          title: 'What',
          share: 2.2,
          cell: (one) => (
            <View>
              <WorkName bold work={one} />
              <Txt kind="small" tone="ink2">
                {one.number}
              </Txt>
            </View>
          ),
        },
        { key: 'minutes', title: 'Takes', share: 1.3, cell: (one) => workMinutes(one.likelyMinutes, one.longMinutes) },
        { key: 'place', title: 'Place', tone: 'ink2', cell: ({ place }) => place?.name ?? 'any' },
        { key: 'skill', title: 'Skill', tone: 'ink2', cell: ({ skill }) => skill?.name ?? 'none' },
        {
          key: 'priority',
          title: 'Priority',
          width: 84,
          tone: 'ink2',
          cell: ({ priority }) => workPriorityNames[priority],
        },
        {
          key: 'due',
          title: 'Due',
          width: 104,
          numeric: true,
          cell: (one) =>
            one.dueAt ? (
              <Txt kind="numXS" nowrap tone={isWorkLate(one, now) ? 'alarm' : 'ink'}>
                {due(one)}
              </Txt>
            ) : (
              ''
            ),
        },
        { key: 'who', title: 'Who', share: 1.3, cell: whoHasIt },
      ]}
    />
  );
}

/** Rows, for the phone and for narrow columns. `within` a repair its number is not said again. */
export function WorkList({ work, now, within = false, onOpen }: WorkShown & { within?: boolean }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  return (
    <View role="list" aria-label="Other work">
      {work.map((one) => {
        const due = one.dueAt ? `due ${moment(Date.parse(one.dueAt), zone, now, marks)}` : '';
        const late = isWorkLate(one, now);
        return (
          <View key={one.id} role="listitem">
            <PressableLink
              href={`/work/${one.id}`}
              onGo={() => onOpen(one.id)}
              label={rowLabel(one, due)}
              style={({ pressed }) => [styles.row, pressed && styles.pressed]}
            >
              <View style={styles.line}>
                <WorkName bold work={within ? { ...one, repair: null } : one} style={styles.shrink} />
                {due ? (
                  <Txt kind="small" tone={late ? 'alarm' : 'ink2'} bold={late} nowrap>
                    {due}
                  </Txt>
                ) : null}
              </View>
              <View style={styles.line}>
                <Txt kind="small" tone="ink2" style={styles.shrink}>
                  {[leftWords(one), asksFor(one)].filter(Boolean).join(' · ')}
                </Txt>
                <Txt kind="small" tone="ink2" nowrap>
                  {whoHasIt(one)}
                </Txt>
              </View>
            </PressableLink>
          </View>
        );
      })}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: {
    minHeight: 56,
    justifyContent: 'center',
    paddingVertical: 10,
    borderBottomWidth: 1,
    borderBottomColor: colors.line,
    rowGap: 2,
  },
  pressed: { backgroundColor: colors.well },
  line: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'baseline', columnGap: 12 },
  shrink: { flexShrink: 1 },
}));
