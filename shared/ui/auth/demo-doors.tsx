import { StyleSheet, View } from 'react-native';
import type { Role } from '@/shared/contract/roles';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';

const doors: readonly { role: Role; title: string }[] = [
  { role: 'technician', title: 'Technician' },
  { role: 'foreman', title: 'Foreman' },
  { role: 'manager', title: 'Manager' },
];

/** The demo's way in: each role by one tap. */
export function DemoDoors({
  workshop,
  busy,
  onEnter,
}: {
  workshop: string | null;
  busy: Role | null;
  onEnter: (role: Role) => void;
}) {
  return (
    <View style={styles.box}>
      <Txt kind="label">
        {workshop ? `Look around ${workshop}, a made-up workshop, as` : 'Look around the made-up workshop as'}
      </Txt>
      <View style={styles.row}>
        {doors.map(({ role, title }) => (
          <Button
            key={role}
            title={title}
            label={`Enter the demo as ${role}`}
            look="line"
            size="small"
            grow
            busy={busy === role}
            disabled={busy !== null && busy !== role}
            onPress={() => onEnter(role)}
            style={styles.door}
          />
        ))}
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  box: { rowGap: 8 },
  row: { flexDirection: 'row', columnGap: 8 },
  door: { paddingHorizontal: 4 },
});
