import { useState } from 'react';
import { View } from 'react-native';
import type { ChemistryId } from '@/calc/plan-types';
import type { ChargeDto } from '@/shared/contract/charge';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { emergencySteps, withoutSmoke } from './emergency-words';

/** One tap from every screen of a charge that is not over: what to do first when a module smokes, smells or swells. */
export function Emergency({
  charge,
  chemistry,
}: {
  charge: ChargeDto;
  /** null: the type is not read yet. */
  chemistry: ChemistryId | null;
}) {
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
          {emergencySteps(charge, chemistry).map((step, index) => (
            <View key={step} role="listitem" style={styles.step}>
              <Txt kind="numM">{index + 1}</Txt>
              <Txt style={styles.words}>{step}</Txt>
            </View>
          ))}
        </View>
        <Txt kind="small" tone="ink2">
          {withoutSmoke(charge)}
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
