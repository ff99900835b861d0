import { useState } from 'react';
import { View } from 'react-native';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

/**
 * Common practice, in the order of doing; the workshop's own emergency plan goes before it.
 *
 * @param chemistry as the maker names it: the fire service asks for it
 */
const stepsOf = (chemistry: string | undefined): string[] => [
  'Get everybody out and away. Do not touch or move the module. Do not breathe the smoke: it is poisonous.',
  'Raise the alarm.',
  'Only if you reach it safely, without passing the smoke: switch the charger off at its emergency stop or plug.',
  `Close the door behind you and call the fire service. Say that a traction battery is burning or about to${chemistry ? `: ${chemistry}` : ', lithium or NiMH'}.`,
  'Do not go back in. A module can flare up again hours later: the fire service says when it is safe.',
];

/** One tap from the live screen: what to do first when a module smokes, smells or swells. */
export function Emergency({ chemistry }: { chemistry?: string }) {
  const [open, setOpen] = useState(false);
  const styles = useStyles();
  return (
    <>
      <Button look="danger" size="small" title="Smoke, smell or swelling now" onPress={() => setOpen(true)} />
      <BottomSheet
        open={open}
        onClose={() => setOpen(false)}
        title="Smoke, smell or swelling"
        actions={<Button title="Close" onPress={() => setOpen(false)} />}
      >
        <Txt bold>Your workshop’s own emergency plan and the maker’s instructions come first.</Txt>
        <View role="list" style={styles.list}>
          {stepsOf(chemistry).map((step, index) => (
            <View key={step} role="listitem" style={styles.step}>
              <Txt kind="numM">{index + 1}</Txt>
              <Txt style={styles.words}>{step}</Txt>
            </View>
          ))}
        </View>
        <Txt kind="small" tone="ink2">
          Swelling or warmth without smoke: switch the charger off if you can reach it safely, keep away, and stop the
          charge here afterwards. Such a module is never charged again.
        </Txt>
      </BottomSheet>
    </>
  );
}

const useStyles = makeStyles(() => ({
  list: { rowGap: 10, marginVertical: 12 },
  step: { flexDirection: 'row', columnGap: 14 },
  words: { flex: 1 },
}));
