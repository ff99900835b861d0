import { placeKindNames, type PlaceDto, type SkillDto, type StaffingDto } from '@/shared/contract/staffing';
import { EN_DASH } from '../format/marks';
import { Link } from '../primitives/link';
import { Table, type Column } from '../primitives/table';
import { breakWords, dayOffWords, daysOffToCome, hoursWords, skillNames } from './staffing-form';

const editColumn = <R,>(mayChange: boolean, nameOf: (row: R) => string, onEdit: (row: R) => void): Column<R>[] =>
  mayChange
    ? [
        {
          key: 'edit',
          title: 'Change',
          quietTitle: true,
          phone: 'value',
          width: 48,
          cell: (row) => (
            <Link
              tight
              kind="small"
              align="right"
              title="edit"
              label={`Edit ${nameOf(row)}`}
              onPress={() => onEdit(row)}
            />
          ),
        },
      ]
    : [];

/** Who is there when, and what they can do. */
export function StaffingTable({
  people,
  skills,
  today,
  mayChange,
  onEdit,
}: {
  people: readonly StaffingDto[];
  skills: readonly SkillDto[];
  /** 'YYYY-MM-DD' in the workshop's zone. */
  today: string;
  mayChange: boolean;
  onEdit: (person: StaffingDto) => void;
}) {
  return (
    <Table
      label="Hours of people"
      rows={people}
      rowKey={({ person }) => person.id}
      columns={[
        { key: 'name', title: 'Name', phone: 'name', share: 1.2, cell: ({ person }) => person.name },
        {
          key: 'hours',
          title: 'Hours',
          phone: 'detail',
          share: 2,
          cell: ({ hours, hoursNow }) => (hours === null ? 'the workshop’s' : hoursWords(hoursNow)),
        },
        {
          key: 'breaks',
          title: 'Breaks',
          phone: 'detail',
          share: 1.3,
          tone: 'ink2',
          cell: ({ breaks }) => breakWords(breaks) || EN_DASH,
        },
        {
          key: 'off',
          title: 'Off next',
          phone: 'detail',
          share: 1.4,
          tone: 'ink2',
          cell: ({ daysOff }) => {
            const next = daysOffToCome(daysOff, today)[0];
            return next ? dayOffWords(next) : EN_DASH;
          },
        },
        {
          key: 'skills',
          title: 'Skills, for fills',
          phone: 'detail',
          share: 1.6,
          tone: 'ink2',
          cell: ({ skillIds }) => skillNames(skillIds, skills) || EN_DASH,
        },
        ...editColumn<StaffingDto>(mayChange, ({ person }) => `the hours of ${person.name}`, onEdit),
      ]}
    />
  );
}

/** The workshop's own list of skills. */
export function SkillsTable({
  skills,
  mayChange,
  onEdit,
}: {
  skills: readonly SkillDto[];
  mayChange: boolean;
  onEdit: (skill: SkillDto) => void;
}) {
  return (
    <Table
      label="Skills"
      rows={skills}
      rowKey={({ id }) => id}
      columns={[
        { key: 'name', title: 'Name', phone: 'name', share: 2, cell: ({ name }) => name },
        {
          key: 'people',
          title: 'Who has it',
          phone: 'detail',
          cell: ({ people }) => (people === 0 ? 'nobody' : people === 1 ? 'one person' : `${people} people`),
        },
        {
          key: 'use',
          title: 'Asked for by work',
          phone: 'detail',
          tone: 'ink2',
          cell: ({ inUse }) => (inUse ? 'asked for by work' : 'not asked for now'),
        },
        ...editColumn<SkillDto>(mayChange, ({ name }) => name, onEdit),
      ]}
    />
  );
}

/** Bays and benches. */
export function PlacesTable({
  places,
  mayChange,
  onEdit,
}: {
  places: readonly PlaceDto[];
  mayChange: boolean;
  onEdit: (place: PlaceDto) => void;
}) {
  return (
    <Table
      label="Places"
      rows={places}
      rowKey={({ id }) => id}
      columns={[
        { key: 'name', title: 'Name', phone: 'name', share: 2, cell: ({ name }) => name },
        { key: 'kind', title: 'Kind', phone: 'detail', cell: ({ kind }) => placeKindNames[kind] },
        {
          key: 'use',
          title: 'Needed by work',
          phone: 'detail',
          tone: 'ink2',
          cell: ({ inUse }) => (inUse ? 'needed by work' : 'not needed now'),
        },
        ...editColumn<PlaceDto>(mayChange, ({ name }) => name, onEdit),
      ]}
    />
  );
}
