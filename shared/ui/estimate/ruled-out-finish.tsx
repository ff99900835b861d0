import { View } from 'react-native';
import { Txt } from '../primitives/txt';

/** Why one of the two finishes is missing. */
export function RuledOutFinish({ reasons }: { reasons: readonly string[] }) {
  if (reasons.length === 0) return null;
  return (
    <View style={{ rowGap: 4 }}>
      {reasons.map((reason) => (
        <Txt key={reason} kind="small" tone="ink2">
          {reason}
        </Txt>
      ))}
    </View>
  );
}
