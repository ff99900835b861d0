/** The hand-over sheet of a repair: what was found, changed, read, advised and declined, as a PDF. */
import { readingName } from '@/shared/contract/pack-reading';
import type { PaperQuery } from '@/shared/contract/papers';
import { groupsAt, positionsOf } from '@/shared/contract/pack';
import type { Deps, Member } from '../deps';
import type { PackReading } from '../entities/pack-reading';
import type { GroupRow, HandOverContent, PackPicture, ReadingRow } from '../papers/hand-over-content';
import { drawHandOverSheet } from '../papers/hand-over-sheet';
import type { Paper } from '../papers/page';
import { paperWords, type PaperWords } from '../papers/paper-words';
import { eventsOfRepairs } from '../repositories/repair-rows.repository';
import { bare, lowerFirst } from './charge-words';
import { advisedWords, cautionWords, changedWords, firstName, foundWords } from './hand-over-words';
import { ampHoursOf, packVerdict } from './pack-numbers';
import { paperPhotos } from './paper-photos';
import { repairFacts, standing, type RepairFacts } from './repair-facts';
import { loadRepairFile, type RepairFile } from './repair-file';
import { repairSteps } from './repair-steps';

/**
 * The sheet as the repair stands now. The same state gives the same bytes: its date is that of the hand-over, before it
 * that of the last thing that happened.
 * @throws DomainError 404
 */
export async function handOverPaper(deps: Deps, member: Member, id: string, query: PaperQuery): Promise<Paper> {
  const { manager } = deps.dataSource;
  const file = await loadRepairFile(manager, member.workshopId, id);
  const [latest] = (await eventsOfRepairs(manager, member.workshopId, [id])).get(id) ?? [];
  const at = file.repair.handedOverAt ?? latest?.createdAt ?? file.repair.bookedAt;
  const words = paperWords(file.workshop.zone, query.decimal ?? 'point', at);
  const content = { ...handOverContent(file, at, words), photos: await paperPhotos(deps.config, file, words) };
  return {
    name: `hand-over-${file.repair.number}.pdf`,
    bytes: await drawHandOverSheet(content, query.paper ?? 'a4'),
  };
}

/** All that stands on the sheet but the photos, whose pictures lie in files. */
function handOverContent(file: RepairFile, at: number, words: PaperWords): Omit<HandOverContent, 'photos'> {
  const { repair, people, workshop } = file;
  const facts = repairFacts(file);
  const readings = standing(file.readings).reverse();
  const before = facts.arrival ?? readings.find(({ stage }) => stage === 'arrival') ?? null;
  const after = facts.proof;
  const workers = file.personIds.length > 0 ? file.personIds : [repair.bookedById];
  const by = people.get(repair.handedOverById ?? workers[0]!)?.name ?? '';
  return {
    title: `Hand-over sheet, ${repair.number}`,
    workshop: workshop.name,
    date: words.dateLong(at),
    at,
    facts: {
      left: [
        { name: 'Vehicle', value: `${repair.vehicle}, ${packText(file)}` },
        {
          name: 'Brought in',
          value: `${words.dateLong(repair.bookedAt)}, ${words.clock(repair.bookedAt)}${repair.note === null ? '' : `, ${lowerFirst(bare(repair.note))}`}`,
        },
      ],
      right: [
        { name: 'Owner', value: repair.customerName ?? '' },
        { name: 'Work by', value: workers.map((one) => people.get(one)?.name ?? 'somebody').join(', ') },
      ],
    },
    found: foundWords(file, facts, words),
    before: before === null ? null : pictureOf(file, before, 'Before', facts.failing, words),
    after: after === null ? null : pictureOf(file, after, 'After', null, words),
    readings: readings.map((reading) => readingRow(file, reading, words)),
    changed: changedWords(file, repairSteps(file, facts), words),
    advised: advisedWords(file, words),
    cautions: cautionWords(file, facts, words),
    groupsNote: groupsNote(before, after, words),
    groups: groupRows(file, before, after, words),
    sums: [...sumOf(file, 'Before', before, words), ...sumOf(file, 'After', after, words)],
    footnotes: footnotes(file, before, after, facts),
    signatures: [`Handed over, ${by}`, repair.customerName === null ? 'Received' : `Received, ${repair.customerName}`],
    words,
  };
}

function packText({ repair }: RepairFile): string {
  const { groupCount, groupsPerModule } = repair;
  const modules = new Set(positionsOf(repair)).size;
  const each = modules * groupsPerModule === groupCount ? ` of ${groupsPerModule}` : '';
  return `${groupCount} cell ${groupCount === 1 ? 'group' : 'groups'} in ${modules} ${modules === 1 ? 'module' : 'modules'}${each}`;
}

const warmth = (reading: PackReading, words: PaperWords, before: string): string =>
  reading.celsius === null ? '' : `, ${before}${words.celsius(reading.celsius)}`;

function pictureOf(
  { repair }: RepairFile,
  reading: PackReading,
  name: 'Before' | 'After',
  failing: string | null,
  words: PaperWords,
): PackPicture {
  const verdict = packVerdict(reading.groupVolts, repair);
  const position = failing ?? verdict.positions[0] ?? null;
  const groups = position === null ? [] : groupsAt(repair, position);
  const told = groups.filter((group) => verdict.odd.includes(group));
  const shown = told.length > 0 ? told : failing === null ? [] : groups;
  const volts = shown.slice(0, 3).map((group) => words.volts(reading.groupVolts[group] ?? 0));
  const more = shown.length > 3 ? ` and ${shown.length - 3} more` : '';
  return {
    title: `${name}: ${lowerFirst(readingName(reading))}, ${words.date(reading.at)} ${words.clock(reading.at)}${warmth(reading, words, 'at ')}`,
    spread: words.millivolts(verdict.spreadMillivolts),
    groupVolts: reading.groupVolts,
    odd: verdict.odd,
    call: shown.length === 0 ? null : { text: `module ${position}: ${volts.join(', ')}${more}`, groups: shown },
  };
}

function readingRow(file: RepairFile, reading: PackReading, words: PaperWords): ReadingRow {
  const verdict = packVerdict(reading.groupVolts, file.repair);
  const ampHours = ampHoursOf(reading.groupVolts, file.type);
  return {
    name: readingName(reading),
    when: `${words.date(reading.at)} ${words.clock(reading.at)}`,
    lowest: words.volts(verdict.lowestVolts),
    highest: words.volts(verdict.highestVolts),
    spread: words.millivolts(verdict.spreadMillivolts),
    ampHours: ampHours === null ? '–' : words.ampHours(ampHours.spreadAmpHours),
    by: firstName(file, reading.personId),
  };
}

function groupsNote(before: PackReading | null, after: PackReading | null, words: PaperWords): string {
  const said = (name: string, reading: PackReading | null) =>
    reading === null
      ? `${name}: not read.`
      : `${name}: ${words.dateLong(reading.at)}, ${words.clock(reading.at)}${warmth(reading, words, '')}.`;
  return `${said('Before', before)} ${said('After', after)}`;
}

/** Module positions that got another module. */
const changedPositions = ({ charges, fittedAsItIs }: RepairFile): string[] =>
  [...charges.flatMap(({ charge }) => (charge.stage === 'fitted' ? [charge] : [])), ...fittedAsItIs].flatMap(
    ({ modulePosition }) => (modulePosition === null ? [] : [modulePosition]),
  );

function groupRows(
  file: RepairFile,
  before: PackReading | null,
  after: PackReading | null,
  words: PaperWords,
): GroupRow[] {
  const marked = new Set(changedPositions(file).flatMap((position) => groupsAt(file.repair, position)));
  const volts = (reading: PackReading | null, group: number) => {
    const value = reading?.groupVolts[group];
    return value === undefined ? '–' : words.voltsNumber(value);
  };
  return Array.from({ length: file.repair.groupCount }, (_, group) => ({
    name: `G${group + 1}`,
    before: volts(before, group),
    after: volts(after, group),
    marked: marked.has(group),
  }));
}

function sumOf({ repair }: RepairFile, name: string, reading: PackReading | null, words: PaperWords) {
  if (reading === null) return [];
  const { medianVolts, lowestVolts, highestVolts, spreadMillivolts } = packVerdict(reading.groupVolts, repair);
  const values = [medianVolts, lowestVolts, highestVolts].map(words.volts);
  return [{ name, values: [...values, words.millivolts(spreadMillivolts)] }];
}

/** What the star means, and what each of the two was read with. */
function footnotes(
  file: RepairFile,
  before: PackReading | null,
  after: PackReading | null,
  { failing }: RepairFacts,
): string[] {
  const positions = changedPositions(file);
  const star = positions.map((position) => {
    const groups = groupsAt(file.repair, position).map((group) => `G${group + 1}`);
    return `* replaced: module ${position} is ${groups.join(', ')}.`;
  });
  if (star.length === 0 && failing !== null) {
    const groups = groupsAt(file.repair, failing).map((group) => `G${group + 1}`);
    star.push(`Module ${failing} is ${groups.join(', ')}.`);
  }
  const instrument = (reading: PackReading): string => {
    const meter = file.meters.get(reading.meterId ?? '');
    return meter ? `the meter ${meter.name}` : (reading.instrument ?? 'the pack’s own instrument');
  };
  const both = before !== null && after !== null && instrument(before) === instrument(after);
  const read = both
    ? [`Both read with ${instrument(before)}.`]
    : [
        ...(before === null ? [] : [`Before read with ${instrument(before)}.`]),
        ...(after === null ? [] : [`After read with ${instrument(after)}.`]),
      ];
  const count = file.photos.length;
  const photos = count === 0 ? [] : [`${count === 1 ? 'One photo comes' : `${count} photos come`} after this page.`];
  return [[...star, ...read, ...photos].join(' ')].filter((line) => line !== '');
}
