import type { LogChoices, LogPreviewDto } from '@/shared/contract/charge-log';
import { logUnits } from '@/shared/contract/charge-log-words';
import type { ThinningRule } from '@/calc/index';
import { clockText } from '../charge-words';
import type { ChargeFile } from '../charge-file';
import { guessChoices } from './guess-choices';
import { countLeftOut } from './left-out';
import { logBounds } from './log-bounds';
import { cellsOf } from './log-cells';
import { logLines } from './log-lines';
import { makeLogStore, type LogPoint } from './log-store';
import { makeTimeReader } from './log-time';
import { makeLineReader, type LineReading } from './read-line';

/** So many first lines are looked at before anything is read. */
const LINES_LOOKED_AT = 60;
const ROWS_SHOWN = 8;
const SAMPLES = 3;
/** A logger's clock may be this far off, ms: as for a typed reading. */
const SLACK_MS = 60_000;

export interface ReadLog extends Pick<
  LogPreviewDto,
  'choices' | 'columns' | 'lines' | 'readings' | 'leftOut' | 'problem'
> {
  rows: LogPoint[];
  firstAt: number | null;
  lastAt: number | null;
  /** What would be stored. */
  points: LogPoint[];
  within: ThinningRule;
}

/**
 * Reads a log as it comes in, holding a batch of lines and what is stored of it, whatever its length.
 * @param given how to read it; null: guessed by its first lines
 * @throws DomainError as `logLines`, and 400 where its numbers cannot be thinned
 */
export async function readLog(
  source: AsyncIterable<Uint8Array>,
  given: LogChoices | null,
  file: ChargeFile,
  now: number,
): Promise<ReadLog> {
  const batches = logLines(source)[Symbol.asyncIterator]();
  const head: string[] = [];
  for (let ended = false; !ended && head.length < LINES_LOOKED_AT;) {
    const { value, done } = await batches.next();
    if (done) ended = true;
    else head.push(...value);
  }
  const { charge } = file;
  const groups = charge.frozen.module.groupsInSeries;
  const looked = head.slice(0, LINES_LOOKED_AT);
  const choices = chosen(given, looked, groups);
  const columns = columnsOf(looked, choices);
  const problem = head.length === 0 ? 'This file is empty. Choose another one.' : choicesProblem(choices, groups);
  const reader = makeReader(file, choices, columns, now);
  const take = async (lines: string[]): Promise<void> => {
    reader.take(lines);
    // The next batch may be there already: others have their turn first.
    await new Promise((resolve) => setImmediate(resolve));
  };
  if (problem === null) await take(head);
  for (let next = await batches.next(); !next.done; next = await batches.next())
    if (problem === null) await take(next.value);
  return { choices, columns, ...reader.finish(problem) };
}

/** As it is given; what parts the columns may be given alone, and they are guessed by it. */
function chosen(given: LogChoices | null, lines: readonly string[], groups: number): LogChoices {
  if (given === null) return guessChoices(lines, groups);
  return given.columns.length > 0
    ? given
    : { ...guessChoices(lines, groups, given.separator), zeroAt: given.zeroAt, takenAt: given.takenAt };
}

function makeReader(file: ChargeFile, choices: LogChoices, columns: ReadLog['columns'], now: number) {
  const { zone } = file.workshop;
  const startedAt = file.charge.startedAt ?? now;
  const time = choices.columns.find(({ use }) => use === 'time');
  const timeOf = makeTimeReader({
    unit: time?.unit ?? 's',
    dateUnit: choices.columns.find(({ use }) => use === 'date')?.unit ?? null,
    decimal: choices.decimal,
    zone,
    zeroAt: choices.zeroAt === null ? startedAt : Date.parse(choices.zeroAt),
    startedAt,
  });
  const read = makeLineReader(
    choices,
    columns.map(({ name }) => name),
    timeOf,
  );
  const tooEarly = `Before the start of the charge at ${clockText(startedAt, zone, now)}.`;
  const believed = logBounds(file);
  const leftOut = countLeftOut();
  const store = makeLogStore();
  const rows: LogPoint[] = [];
  let [line, lines, readings] = [0, 0, 0];
  let first: number | null = null;
  let before: (LineReading & { at: number }) | null = null;
  const takeLine = (cells: readonly string[] | null): void => {
    if (cells === null) return leftOut.add('quote', 'A quote is not closed.', line);
    const found = read(cells);
    if ('reason' in found) return leftOut.add(found.key, found.reason, line);
    const { at, ...values } = found;
    if (at < startedAt - SLACK_MS) return leftOut.add('early', tooEarly, line);
    if (at > now + SLACK_MS) return leftOut.add('late', 'Still to come, by the server’s clock.', line);
    if (before !== null && at < before.at)
      return leftOut.add('back', 'Earlier than the line before. Sort the log by its time where that is wrong.', line);
    const checked = believed(values);
    if (typeof checked === 'string') return leftOut.add(checked.replace(/[\d.,]+/g, '#'), checked, line);
    const reading = { at, ...checked };
    if (before !== null && before.at === at && same(before, reading))
      return leftOut.add('twice', 'The same as the line before.', line);
    before = reading;
    first ??= at;
    readings += 1;
    const point: LogPoint = { s: at / 1000, line, ...reading };
    if (rows.length < ROWS_SHOWN) rows.push(point);
    store.push(point);
  };
  return {
    take: (batch: string[]): void => {
      const cells = cellsOf(batch, choices.separator);
      batch.forEach((text, at) => {
        line += 1;
        if (text.trim() === '') return;
        lines = line;
        if (line <= choices.headerLine) return;
        takeLine(cells[at]!);
      });
    },
    finish: (problem: string | null) => ({
      ...store.finish(),
      rows,
      lines,
      readings,
      firstAt: first,
      lastAt: before?.at ?? null,
      leftOut: leftOut.list(),
      problem:
        problem ??
        (readings === 0 ? 'No line of it is a reading as it is read now. Change what the columns are.' : null),
    }),
  };
}

const same = (one: LineReading, other: LineReading): boolean =>
  one.terminalVolts === other.terminalVolts &&
  one.amps === other.amps &&
  one.celsius === other.celsius &&
  JSON.stringify(one.groupVolts) === JSON.stringify(other.groupVolts);

function columnsOf(lines: readonly string[], choices: LogChoices): ReadLog['columns'] {
  const rows = cellsOf(lines, choices.separator).map((row) => row ?? []);
  const names = choices.headerLine === 0 ? [] : (rows[choices.headerLine - 1] ?? []);
  const values = rows.slice(choices.headerLine).filter((row) => row.length >= choices.columns.length);
  return choices.columns.map((_, at) => ({
    name: names[at]?.trim().slice(0, 60) || `Column ${at + 1}`,
    samples: values.slice(0, SAMPLES).map((row) => row[at]!.trim().slice(0, 40)),
  }));
}

/** What is wrong with how the columns are chosen, whatever the lines hold. */
function choicesProblem({ columns }: LogChoices, groups: number): string | null {
  const count = (use: string): number => columns.filter((column) => column.use === use).length;
  for (const { use, unit } of columns)
    if (use !== 'none' && !logUnits[use].some(([known]) => known === unit))
      return 'Choose the unit of each column that is read.';
  if (count('time') === 0) return 'No column is the time. Choose the one that is.';
  for (const [use, name] of [
    ['time', 'the time'],
    ['date', 'the day'],
    ['volts', 'the volts at the clips'],
    ['amps', 'the amps'],
    ['celsius', 'the temperature'],
  ] as const)
    if (count(use) > 1) return `${count(use)} columns are ${name}. Choose one, and “Not read” for the others.`;
  if (count('date') > 0 && columns.find(({ use }) => use === 'time')!.unit !== 'clock')
    return 'A column with the day goes with a time of day. Choose that for the time, or “Not read” for the day.';
  if (count('group') > 0 && count('group') !== groups)
    return `This module has ${groups} ${groups === 1 ? 'group' : 'groups'}, ${count('group')} columns are groups. Choose all of them, or none.`;
  if (count('volts') + count('amps') + count('celsius') + count('group') === 0)
    return 'No column holds volts, amps or a temperature. Choose the one that does.';
  return null;
}
