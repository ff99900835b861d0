import { useState } from 'react';
import { View } from 'react-native';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

/** Common practice, in the order of doing; the workshop's own emergency plan goes before it. */
const steps = [
  'Everybody away from the bench. Do not touch or move the module.',
  'Switch the charger off at its emergency stop or plug, only if you reach it without passing the smoke.',
  'Get everybody out, close the door behind you, do not breathe the smoke. It is poisonous.',
  'Raise the alarm and call the fire service. Say that a traction battery module is burning or about to, and its chemistry.',
  'Do not go back in. A module can flare up again hours later: the fire service decides when it is safe.',
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
          {steps.map((step, index) => (
            <View key={step} role="listitem" style={styles.step}>
              <Txt kind="numM">{index + 1}</Txt>
              <Txt style={styles.words}>{step}</Txt>
            </View>
          ))}
        </View>
        {chemistry ? <Txt tone="ink2">{`This module: ${chemistry}.`}</Txt> : null}
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
