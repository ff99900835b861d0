import { View } from 'react-native';
import { alertKindNames } from '@/shared/contract/alert-kinds';
import type { UndeliveredDto } from '@/shared/contract/alert-settings';
import { ProblemLine } from '../auth/problem-line';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Txt } from '../primitives/txt';

const wayWords = { 'browser-push': 'by browser', 'phone-push': 'by phone', 'e-mail': 'by e-mail' } as const;

/** What could not be brought to somebody: whom, why, and what is done about it. */
export function UndeliveredList({
  entries,
  now,
  busyId,
  offline,
  problem,
  onDecide,
}: {
  entries: readonly UndeliveredDto[];
  now: number;
  /** The one that is being decided. */
  busyId: string | null;
  offline: boolean;
  problem: string | null;
  onDecide: (id: string, what: 'again' | 'drop') => void;
}) {
  const { zone, marks } = useFormats();
  return (
    <CallOut tone="amber" label="Not brought">
      <Txt bold>
        {entries.length === 1 ? 'One alert could not be brought.' : `${entries.length} alerts could not be brought.`}
      </Txt>
      {entries.map(({ id, alert, person, way, tries, reason, at, open }) => {
        const name = `${alertKindNames[alert.kind]}, ${alert.title}`;
        const times = tries === 1 ? 'one try' : `${tries} tries`;
        return (
          <View key={id} style={{ marginTop: 12, rowGap: 4 }}>
            <Txt>{`${name}, to ${person.name} ${wayWords[way]}`}</Txt>
            <Txt kind="small" tone="ink2">
              {`Given up at ${moment(Date.parse(at), zone, now, marks)} after ${times}. ${reason}${open ? '' : ' It is settled since, or somebody has it.'}`}
            </Txt>
            <View style={{ flexDirection: 'row', columnGap: 8, marginTop: 4 }}>
              {open ? (
                <Button
                  title="Send again"
                  label={`Send again: ${name}, to ${person.name}`}
                  look="line"
                  size="small"
                  busy={busyId === id}
                  disabled={offline}
                  onPress={() => onDecide(id, 'again')}
                />
              ) : null}
              <Button
                title="Drop"
                label={`Drop: ${name}, to ${person.name}`}
                look="line"
                size="small"
                disabled={offline || busyId === id}
                onPress={() => onDecide(id, 'drop')}
              />
            </View>
          </View>
        );
      })}
      {offline ? (
        <Txt kind="small" tone="ink2">
          Sending and dropping need the connection.
        </Txt>
      ) : null}
      <ProblemLine text={problem} />
    </CallOut>
  );
}
