import type { ErrorBoundaryProps } from 'expo-router';
import { StyleSheet, View } from 'react-native';
import { ErrorState } from '../states/error-state';
import { Surface } from '../theme/surface';

/** A part of the app could not be fetched: the page is from before an update, or the connection broke. */
const isMissingPart = (error: Error): boolean =>
  /chunk|dynamically imported|Loading module|load script|fetch/i.test(`${error.name} ${error.message}`);

/** What a route shows when its code fails; exported by every route file. */
export function ErrorBoundary({ error, retry }: ErrorBoundaryProps) {
  const missing = isMissingPart(error);
  return (
    <Surface tone="ground" style={styles.page}>
      <View role="main" style={styles.column}>
        <ErrorState
          failed={missing ? 'A part of this page could not be fetched.' : 'This page failed on this device.'}
          safe="The charges and what you typed are kept."
          toDo={missing ? 'Check the connection, then load the page again.' : 'Load the page again.'}
          action={{
            title: 'Load it again',
            onPress: () => {
              // A page from before an update finds its parts only by loading anew.
              if (missing) globalThis.location?.reload();
              else void retry();
            },
          }}
        />
      </View>
    </Surface>
  );
}

const styles = StyleSheet.create({
  page: { flex: 1, padding: 16 },
  column: { width: '100%', maxWidth: 560, marginHorizontal: 'auto', paddingTop: 24 },
});
