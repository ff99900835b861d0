import type { InvitationDto, PersonDto } from '@/shared/contract/people';
import { ageShort, moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { EN_DASH } from '../format/marks';
import { Link } from '../primitives/link';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { useBreakpoint } from '../theme/use-breakpoint';
import { roleWords } from './role-words';

type Row = { key: string; person: PersonDto } | { key: string; invitation: InvitationDto };

/** Seen within this time counts as here now. */
const hereMs = 3 * 60_000;

/** People with their roles, then those invited and not yet joined. */
export function PeopleTable({
  people,
  invitations,
  skillsOf,
  now,
  mayChange,
  onEdit,
  onRecall,
}: {
  people: readonly PersonDto[];
  invitations: readonly InvitationDto[];
  /** 'packs, brakes'; '' where none are known. */
  skillsOf: (personId: string) => string;
  now: number;
  mayChange: boolean;
  onEdit: (person: PersonDto) => void;
  onRecall: (invitation: InvitationDto) => void;
}) {
  const { zone, marks } = useFormats();
  const phone = useBreakpoint() === 'phone';
  const seen = (person: PersonDto): string => {
    if (person.disabled) return 'disabled';
    if (!person.lastSeenAt) return EN_DASH;
    const at = Date.parse(person.lastSeenAt);
    if (now - at < hereMs) return 'now';
    return now - at < 6 * 86_400_000 ? moment(at, zone, now, marks) : ageShort(at, zone, now);
  };
  const rows: Row[] = [
    ...people.map((person) => ({ key: person.id, person })),
    ...invitations.map((invitation) => ({ key: invitation.id, invitation })),
  ];
  return (
    <Table
      label="People and roles"
      rows={rows}
      rowKey={(row) => row.key}
      columns={[
        {
          key: 'name',
          title: 'Name',
          phone: 'name',
          share: 1.2,
          cell: (row) =>
            'person' in row ? (
              <Txt bold tone={row.person.disabled ? 'ink3' : 'ink'}>
                {row.person.name}
              </Txt>
            ) : (
              <Txt tone="ink2">not joined</Txt>
            ),
        },
        {
          key: 'role',
          title: 'Role',
          phone: 'detail',
          cell: (row) => roleWords['person' in row ? row.person.role : row.invitation.role].title,
        },
        {
          key: 'email',
          title: 'E-mail',
          phone: 'detail',
          share: 2.5,
          tone: 'ink2',
          cell: (row) => ('person' in row ? row.person.email : row.invitation.email),
        },
        {
          key: 'skills',
          title: 'Skills, for fills',
          phone: 'none',
          share: 1.5,
          tone: 'ink2',
          cell: (row) => ('person' in row ? skillsOf(row.person.id) : ''),
        },
        {
          key: 'seen',
          title: 'Seen',
          phone: 'detail',
          share: 1.2,
          cell: (row) =>
            'person' in row
              ? `${phone && !row.person.disabled && row.person.lastSeenAt ? 'seen ' : ''}${seen(row.person)}`
              : row.invitation.lapsed
                ? 'lapsed'
                : `lapses ${moment(Date.parse(row.invitation.expiresAt), zone, now, marks)}`,
        },
        ...(mayChange
          ? [
              {
                key: 'act',
                title: 'Change',
                quietTitle: true,
                phone: 'value' as const,
                width: 64,
                cell: (row: Row) =>
                  'person' in row ? (
                    <Link
                      tight
                      kind="small"
                      align="right"
                      title="edit"
                      label={`Edit ${row.person.name}`}
                      onPress={() => onEdit(row.person)}
                    />
                  ) : (
                    <Link
                      tight
                      kind="small"
                      align="right"
                      title="recall"
                      label={`Recall the invitation of ${row.invitation.email}`}
                      onPress={() => onRecall(row.invitation)}
                    />
                  ),
              },
            ]
          : []),
      ]}
    />
  );
}
