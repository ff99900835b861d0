import { View } from 'react-native';
import { useGate } from '@/shared/client/gate';
import type { RepairDto } from '@/shared/contract/repair';
import type { RepairSheet } from '@/shared/ui/repair/repair-next';
import { BottomSheet } from '@/shared/ui/primitives/bottom-sheet';
import { Button } from '@/shared/ui/primitives/button';
import { Rule } from '@/shared/ui/primitives/rule';
import { Txt } from '@/shared/ui/primitives/txt';

/** Everything that can be done with a repair beside its next step; what cannot says why. */
export function RepairMenu({
  repair,
  offline,
  onGo,
  onSheet,
  onClose,
}: {
  repair: RepairDto;
  offline: boolean;
  onGo: (path: string) => void;
  onSheet: (sheet: RepairSheet) => void;
  onClose: () => void;
}) {
  const gate = useGate('repair:delete');
  const people = gate.people.length > 0 ? ` (${gate.people.join(', ')})` : '';
  const open = repair.state === 'open';
  const over = repair.state === 'archived' || repair.state === 'deleted';
  const charging = repair.charge !== null;
  const why = offline
    ? 'No connection: this waits until it is back.'
    : !gate.may
      ? `Repairs are deleted by ${gate.roles}${people}.`
      : charging
        ? 'A charge is open for it. End that first.'
        : null;
  const then = (act: () => void) => () => {
    onClose();
    act();
  };
  return (
    <BottomSheet open title={repair.number} onClose={onClose}>
      <View style={{ rowGap: 8 }}>
        <Button
          look="line"
          title="New pack reading"
          disabled={!open}
          describedBy="repair-menu-over"
          onPress={then(() => onGo(`/repairs/${repair.id}/reading`))}
        />
        <Button
          look="line"
          title="Change what was booked"
          disabled={over}
          describedBy="repair-menu-over"
          onPress={then(() => onGo(`/repairs/${repair.id}/edit`))}
        />
        <Button
          look="line"
          title="Record the module taken out"
          disabled={over || offline}
          describedBy="repair-menu-over"
          onPress={then(() => onSheet('removed'))}
        />
        <Button
          look="line"
          title="Hand it over"
          disabled={!open || offline}
          describedBy="repair-menu-over"
          onPress={then(() => onSheet('hand-over'))}
        />
        {open && !offline ? null : (
          <Txt kind="small" tone="ink2" nativeID="repair-menu-over">
            {offline
              ? 'No connection: what is written waits until it is back.'
              : over
                ? 'Bring it back first, then it can be changed.'
                : 'It was handed over: its readings are closed.'}
          </Txt>
        )}
        <Rule gap={4} />
        <Button
          look="danger"
          title="Delete the repair"
          disabled={why !== null || over}
          describedBy="repair-menu-delete"
          onPress={then(() => onSheet('delete'))}
        />
        {why ? (
          <Txt kind="small" tone="ink2" nativeID="repair-menu-delete">
            {why}
          </Txt>
        ) : null}
      </View>
    </BottomSheet>
  );
}
