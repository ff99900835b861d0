import { View } from 'react-native';
import type { SpareDto } from '@/shared/contract/spare';
import { date } from '../format/clock';
import { useFormats } from '../format/formats';
import { CallOut } from '../primitives/call-out';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { ruledOutWords } from './spare-words';

/** Why it cannot be planned, over everything else; nothing where it can. */
export function SpareStanding({ spare, now }: { spare: SpareDto; now: number }) {
  const { zone, marks } = useFormats();
  const why = ruledOutWords(spare, marks);
  if (why === null) return null;
  const { quarantine } = spare;
  return (
    <CallOut tone="red" label={quarantine ? 'In quarantine' : 'Not to be charged'}>
      <StageTag stage={quarantine ? 'stopped' : 'overdue'} text={quarantine ? 'Quarantine' : 'Not to be charged'} />
      <View style={{ marginTop: 8, rowGap: 2 }}>
        <Txt bold>{why.replace(/[^.]$/, '$&.')}</Txt>
        {quarantine ? (
          <Txt
            kind="small"
            tone="ink2"
          >{`${quarantine.by.name}, ${date(Date.parse(quarantine.at), zone, now)}. It is never offered for a plan.`}</Txt>
        ) : null}
      </View>
    </CallOut>
  );
}
