import type { ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import { Txt } from '../primitives/txt';
import { Foot } from '../screen/foot';
import { useBreakpoint } from '../theme/use-breakpoint';

/** The one next step of a task: in the foot of the phone, at the foot of the side column on the desk. */
export interface NextStepPlaces {
  foot: ReactNode;
  side: ReactNode;
}

/**
 * Puts the next step where it belongs.
 *
 * @param problem why the last try failed; stands in the note's place and is read out
 * @param note the reason of a disabled button, or what the step will bring
 */
export function useNextStep({
  problem,
  note,
  noteId,
  children,
}: {
  problem: string | null;
  note: string | null;
  noteId: string;
  children: ReactNode;
}): NextStepPlaces {
  const wide = useBreakpoint() === 'wide';
  const says = problem ? (
    <Txt kind="label" tone="alarm" role="alert">
      {problem}
    </Txt>
  ) : note ? (
    <Txt kind="small" tone="ink2">
      {note}
    </Txt>
  ) : null;
  if (!wide)
    return {
      foot: (
        <Foot note={says} noteId={noteId}>
          {children}
        </Foot>
      ),
      side: null,
    };
  return {
    foot: undefined,
    side: (
      <View style={styles.side}>
        {says ? <View nativeID={noteId}>{says}</View> : null}
        {children}
      </View>
    ),
  };
}

const styles = StyleSheet.create({ side: { rowGap: 8, marginTop: 16 } });
