import type { ReactNode } from 'react';
import { View } from 'react-native';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { HeaderBar } from '../screen/header-bar';
import { Screen } from '../screen/screen';
import { ErrorState } from '../states/error-state';
import { Loading } from '../states/loading';
import type { PartState } from './section-block';

/** The page around one form of the settings, with what stands there until its data is here. */
export function FormScreen({
  title,
  sub,
  onBack,
  action,
  foot,
  what,
  state,
  onRetry,
  single = true,
  children,
}: {
  title: string;
  sub?: string;
  onBack: () => void;
  action?: ReactNode;
  foot?: ReactNode;
  /** 'the charger' */
  what: string;
  state: PartState;
  onRetry: () => void;
  single?: boolean;
  children: ReactNode;
}) {
  return (
    <Screen
      single={single}
      header={<HeaderBar title={title} sub={sub} onBack={onBack} action={state === 'ready' ? action : undefined} />}
      foot={state === 'ready' ? foot : undefined}
    >
      {state === 'ready' ? (
        <View style={{ rowGap: 16, paddingBottom: 16 }}>{children}</View>
      ) : state === 'loading' ? (
        <Loading what={what} onRetry={onRetry} />
      ) : (
        <ErrorState
          failed={`${what[0]?.toUpperCase()}${what.slice(1)} could not be read.`}
          toDo={state.failed}
          action={{ title: 'Try again', onPress: onRetry }}
        />
      )}
    </Screen>
  );
}

/** Typed on an earlier visit and brought back; the way to throw it away. */
export function Restored({ restored, onAfresh }: { restored: boolean; onAfresh: () => void }) {
  if (!restored) return null;
  return (
    <View style={{ flexDirection: 'row', alignItems: 'center', flexWrap: 'wrap', columnGap: 12 }}>
      <Txt kind="small" tone="ink2">
        What you typed on an earlier visit is back.
      </Txt>
      <Link kind="small" title="start afresh" onPress={onAfresh} />
    </View>
  );
}
