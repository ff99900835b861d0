import type { ReactNode } from 'react';
import { View } from 'react-native';
import { Txt } from '../primitives/txt';
import { ErrorState } from '../states/error-state';
import { Loading } from '../states/loading';

/** How far the data of a part is: there, still coming, or refused with its sentence. */
export type PartState = 'ready' | 'loading' | { failed: string };

/** One part of the workshop's settings: heading, what one can do there, its content or why there is none. */
export function SectionBlock({
  id,
  title,
  aside,
  note,
  state,
  what,
  onRetry,
  titled = true,
  children,
}: {
  id: string;
  title: string;
  /** At the right of the heading: a link, a small sentence. */
  aside?: ReactNode;
  /** Who may change it, where this person may not. */
  note?: string | null;
  state: PartState;
  /** 'the people': what is loading. */
  what: string;
  onRetry: () => void;
  /** false where the header says it already. */
  titled?: boolean;
  children: ReactNode;
}) {
  return (
    <View nativeID={`part-${id}`} role="region" aria-label={title} style={{ rowGap: 6, minWidth: 0 }}>
      {titled || aside ? (
        <View style={{ flexDirection: 'row', alignItems: 'center', columnGap: 12, minHeight: 36 }}>
          {titled ? (
            <Txt kind="heading" heading={2} style={{ flexGrow: 1, flexShrink: 1 }}>
              {title}
            </Txt>
          ) : (
            <View style={{ flex: 1 }} />
          )}
          {aside}
        </View>
      ) : null}
      {state === 'ready' ? (
        children
      ) : state === 'loading' ? (
        <Loading what={what} onRetry={onRetry} rows={3} />
      ) : (
        <ErrorState
          failed={`${what[0]?.toUpperCase()}${what.slice(1)} could not be read.`}
          toDo={state.failed}
          action={{ title: 'Try again', onPress: onRetry }}
        />
      )}
      {note ? (
        <Txt kind="small" tone="ink2">
          {note}
        </Txt>
      ) : null}
    </View>
  );
}
