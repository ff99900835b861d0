import { View } from 'react-native';
import { groupsAt } from '@/shared/contract/pack';
import type { RepairDto } from '@/shared/contract/repair';
import { firstName } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { volts } from '../format/quantities';
import { Txt } from '../primitives/txt';
import { StageGlyph } from '../stage/stage-glyph';
import { sourceWords } from './repair-words';

/** The latest second source in two lines: what it says, and what was read where by whom. */
export function SourceLine({ repair, now }: { repair: RepairDto; now: number }) {
  const { zone, marks } = useFormats();
  const source = [...repair.sources].sort((a, b) => b.at.localeCompare(a.at))[0];
  if (!source) return null;
  const { title, agrees } = sourceWords(source);
  const groups = groupsAt(repair.pack, source.modulePosition);
  const read = source.groupVolts.slice(0, 4).map((value, i) => {
    const group = groups[i];
    return `${volts(value, marks)}${group === undefined ? '' : ` at G${group + 1}`}`;
  });
  return (
    <View style={{ flexDirection: 'row', columnGap: 12, alignItems: 'flex-start' }}>
      <StageGlyph stage={agrees ? 'ready' : 'overdue'} size={24} tone={agrees ? 'ready' : 'alarm'} />
      <View style={{ flex: 1, minWidth: 0 }}>
        <Txt bold>{title}</Txt>
        <Txt tone="ink2">
          {`Hand meter ${read.join(', ')} · ${firstName(source.by.name)}, ${moment(Date.parse(source.at), zone, now, marks)}`}
        </Txt>
        {source.decided ? <Txt tone="ink2">{source.decided.reason}</Txt> : null}
      </View>
    </View>
  );
}
