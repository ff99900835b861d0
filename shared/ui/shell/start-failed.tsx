import { StyleSheet, View } from 'react-native';
import { ErrorState } from '../states/error-state';
import { Surface } from '../theme/surface';

/** The app started without reaching the server. */
export function StartFailed({ busy, onRetry }: { busy: boolean; onRetry: () => void }) {
  return (
    <Surface tone="ground" style={styles.page}>
      <View role="main" style={styles.column}>
        <ErrorState
          failed="Bidewell was not reached."
          safe="The charges go on as they were set, and what you typed here is kept."
          toDo="Check that this device is in the workshop’s network."
          action={{ title: 'Try again', onPress: onRetry, busy }}
        />
      </View>
    </Surface>
  );
}

const styles = StyleSheet.create({
  page: { flex: 1, padding: 16 },
  column: { width: '100%', maxWidth: 560, marginHorizontal: 'auto', paddingTop: 24 },
});
