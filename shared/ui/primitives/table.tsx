import { Fragment, type ReactNode } from 'react';
import { Pressable, View } from 'react-native';
import { makeStyles } from '../theme/make-styles';
import { useBreakpoint } from '../theme/use-breakpoint';
import { web, type WebKeyEvent } from '../theme/web-props';
import { Txt } from './txt';

export interface Column<R> {
  key: string;
  title: string;
  /** What stands in the cell; a string gets the table's own look. */
  cell: (row: R) => ReactNode;
  /** Numbers stand at the right, in the condensed face. */
  numeric?: boolean;
  /** Fixed width, px; without it the column takes a share. */
  width?: number;
  share?: number;
  tone?: 'ink' | 'ink2';
  /** Place in the phone's row: the name (bold, first), the number at its right, a small line below, or nowhere. */
  phone?: 'name' | 'value' | 'detail' | 'none';
  /** The heading is for readers only (a column of links). */
  quietTitle?: boolean;
}

export interface TableProps<R> {
  /** Names the table for readers; not drawn. */
  label: string;
  columns: readonly Column<R>[];
  rows: readonly R[];
  rowKey: (row: R) => string;
  /** Opens a row: Enter, a tap anywhere in it. Arrow keys walk. */
  onOpen?: (row: R) => void;
  rowLabel?: (row: R) => string;
  /** Ground of a row that stands out. */
  rowTone?: (row: R) => 'sheet' | 'alarmTint' | null;
  rowHeight?: number;
  /** A heading over a row where a new group begins; null for none. */
  groupHeading?: (row: R, before: R | undefined) => ReactNode;
  /** Keeps the table on the phone too: for few and narrow columns. */
  keepOnPhone?: boolean;
  /** Shown instead of rows. */
  empty?: ReactNode;
}

/** A real table on the desk, rows with name and number on the phone. */
export function Table<R>(props: TableProps<R>) {
  const phone = useBreakpoint() === 'phone' && !props.keepOnPhone;
  if (props.rows.length === 0 && props.empty) return <>{props.empty}</>;
  return phone ? <RowList {...props} /> : <Grid {...props} />;
}

const columnStyle = <R,>({ width, share }: Column<R>) =>
  width !== undefined ? { width, flexGrow: 0, flexShrink: 0 } : { flexGrow: share ?? 1, flexBasis: 0, minWidth: 0 };

function walkRows(event: WebKeyEvent): void {
  if (event.key !== 'ArrowDown' && event.key !== 'ArrowUp') return;
  const row = event.currentTarget as HTMLElement;
  const rows = Array.from(row.parentElement?.querySelectorAll<HTMLElement>('[data-row]') ?? []);
  const next = rows[rows.indexOf(row) + (event.key === 'ArrowDown' ? 1 : -1)];
  if (!next) return;
  event.preventDefault();
  next.focus();
}

function Grid<R>({
  label,
  columns,
  rows,
  rowKey,
  onOpen,
  rowLabel,
  rowTone,
  rowHeight = 38,
  groupHeading,
}: TableProps<R>) {
  const styles = useStyles();
  return (
    <View role="table" aria-label={label}>
      <View role="row" style={styles.head}>
        {columns.map((column) => (
          <View key={column.key} {...web({ role: 'columnheader' })} style={columnStyle(column)}>
            <Txt
              kind="small"
              tone="ink2"
              bold
              align={column.numeric ? 'right' : 'left'}
              style={column.quietTitle && styles.quiet}
            >
              {column.title}
            </Txt>
          </View>
        ))}
      </View>
      {rows.map((row, index) => {
        const tone = rowTone?.(row);
        const cells = columns.map((column) => (
          <View key={column.key} role="cell" style={[styles.cell, columnStyle(column), column.numeric && styles.right]}>
            <Cell column={column} row={row} />
          </View>
        ));
        const look = [styles.row, { minHeight: rowHeight }, tone && styles[tone]];
        const heading = groupHeading?.(row, rows[index - 1]);
        return (
          <Fragment key={rowKey(row)}>
            {heading ? (
              <View role="row" style={[styles.group, index > 0 && styles.groupAfter]}>
                <View role="cell" {...web({ 'aria-colspan': columns.length })}>
                  {heading}
                </View>
              </View>
            ) : null}
            {onOpen ? (
              <Pressable
                role="row"
                aria-label={rowLabel?.(row)}
                {...web({ onKeyDown: walkRows, dataSet: { row: '', press: '' } })}
                onPress={() => onOpen(row)}
                style={({ pressed }) => [look, pressed && styles.pressed]}
              >
                {cells}
              </Pressable>
            ) : (
              <View role="row" style={look}>
                {cells}
              </View>
            )}
          </Fragment>
        );
      })}
    </View>
  );
}

function Cell<R>({ column, row }: { column: Column<R>; row: R }) {
  const content = column.cell(row);
  if (typeof content !== 'string' && typeof content !== 'number') return <>{content}</>;
  return (
    <Txt
      kind={column.numeric ? 'numXS' : 'body'}
      tone={column.tone}
      align={column.numeric ? 'right' : 'left'}
      nowrap={column.numeric}
    >
      {content}
    </Txt>
  );
}

function RowList<R>({ label, columns, rows, rowKey, onOpen, rowLabel, rowTone, groupHeading }: TableProps<R>) {
  const styles = useStyles();
  const placed = (place: Column<R>['phone']) => columns.filter((column) => placeOf(column, columns) === place);
  return (
    <View role="list" aria-label={label}>
      {rows.map((row, index) => {
        const tone = rowTone?.(row);
        const look = [styles.phoneRow, tone && styles[tone]];
        const heading = groupHeading?.(row, rows[index - 1]);
        const body = (
          <>
            <View style={styles.phoneNames}>
              {placed('name').map((column) => (
                <Fragment key={column.key}>{phoneName(column.cell(row))}</Fragment>
              ))}
              <Details columns={placed('detail')} row={row} />
            </View>
            {placed('value').map((column) => (
              <View key={column.key} style={styles.right}>
                <Cell column={{ ...column, numeric: true }} row={row} />
              </View>
            ))}
          </>
        );
        return (
          <View role="listitem" key={rowKey(row)}>
            {heading ? <View style={styles.group}>{heading}</View> : null}
            {onOpen ? (
              <Pressable
                role="button"
                aria-label={rowLabel?.(row)}
                onPress={() => onOpen(row)}
                {...web({ dataSet: { press: '' } })}
                style={({ pressed }) => [look, pressed && styles.pressed]}
              >
                {body}
              </Pressable>
            ) : (
              <View style={look}>{body}</View>
            )}
          </View>
        );
      })}
    </View>
  );
}

/** The first column is the name and the last numeric one the value, where the columns do not say so themselves. */
export function placeOf<R>(column: Column<R>, columns: readonly Column<R>[]): NonNullable<Column<R>['phone']> {
  if (column.phone) return column.phone;
  if (column === columns[0]) return 'name';
  const lastNumeric = columns.filter((each) => each.numeric && !each.phone).at(-1);
  return column === lastNumeric ? 'value' : 'detail';
}

const phoneName = (content: ReactNode) =>
  typeof content === 'string' || typeof content === 'number' ? <Txt bold>{content}</Txt> : content;

function Details<R>({ columns, row }: { columns: readonly Column<R>[]; row: R }) {
  const styles = useStyles();
  const contents = columns.map((column) => ({ key: column.key, content: column.cell(row) }));
  const words = contents
    .map(({ content }) => content)
    .filter((content) => (typeof content === 'string' && content !== '') || typeof content === 'number');
  return (
    <>
      {words.length > 0 ? (
        <Txt kind="small" tone="ink2">
          {words.join(' · ')}
        </Txt>
      ) : null}
      {contents.map(({ key, content }) =>
        typeof content === 'object' && content !== null ? (
          <View key={key} style={styles.detail}>
            {content}
          </View>
        ) : null,
      )}
    </>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  head: { flexDirection: 'row', columnGap: 16, paddingVertical: 6, alignItems: 'flex-end' },
  quiet: { position: 'absolute', width: 1, height: 1, overflow: 'hidden' },
  row: { flexDirection: 'row', columnGap: 16, alignItems: 'center', borderTopWidth: 1, borderTopColor: colors.line },
  cell: { justifyContent: 'center', paddingVertical: 3 },
  right: { alignItems: 'flex-end' },
  pressed: { backgroundColor: colors.well },
  // The ground of a row that stands out reaches 12 px over the text on both sides.
  sheet: { backgroundColor: colors.sheet, boxShadow: `-12px 0 0 ${colors.sheet}, 12px 0 0 ${colors.sheet}` },
  alarmTint: {
    backgroundColor: colors.alarmTint,
    boxShadow: `-12px 0 0 ${colors.alarmTint}, 12px 0 0 ${colors.alarmTint}`,
  },
  group: { paddingTop: 9, paddingBottom: 4, borderTopWidth: 1, borderTopColor: colors.line },
  groupAfter: { borderTopWidth: 1.5, borderTopColor: colors.edge },
  phoneRow: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    minHeight: 56,
    paddingVertical: 8,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  phoneNames: { flex: 1, minWidth: 0 },
  detail: { marginTop: 4 },
}));
