import type { ReactNode } from 'react';
import { View } from 'react-native';
import type { RepairCardDto } from '@/shared/contract/repair';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';

/** A step of a repair as a task: its name over the repair's, the way back, and the one next thing in the foot. */
export function StepScreen({
  title,
  repair,
  onBack,
  foot,
  children,
}: {
  title: string;
  repair: Pick<RepairCardDto, 'number' | 'vehicle'>;
  onBack: () => void;
  foot?: ReactNode;
  children: ReactNode;
}) {
  return (
    <Screen
      single
      header={<HeaderBar title={title} sub={`${repair.number} · ${repair.vehicle}`} onBack={onBack} />}
      foot={foot}
    >
      <View style={{ rowGap: 14, paddingBottom: 16 }}>{children}</View>
    </Screen>
  );
}
