import { StyleSheet, View } from 'react-native';
import { Txt } from '../primitives/txt';
import { StageGlyph } from '../stage/stage-glyph';

/** Why a form was not taken where no single field is to blame; read out when it appears. */
export function ProblemLine({ text }: { text: string | null | undefined }) {
  return (
    <View role="alert" style={text ? styles.row : null}>
      {text ? (
        <>
          <StageGlyph stage="overdue" size={18} />
          <Txt kind="label" tone="alarm" style={styles.words}>
            {text}
          </Txt>
        </>
      ) : null}
    </View>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', columnGap: 6, alignItems: 'flex-start' },
  words: { flex: 1 },
});
