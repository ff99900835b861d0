import { View } from 'react-native';
import type { WorkDto } from '@/shared/contract/work';
import { workPriorityNames } from '@/shared/contract/work-terms';
import { firstName } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { FactList, type Fact } from '../primitives/fact-list';
import { Link } from '../primitives/link';
import { Duration } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { isWorkLate, workMinutes, workStateNames } from './work-words';

/** What a piece of work takes and asks for; its likely minutes lead. */
export function WorkFacts({ work, now, onGo }: { work: WorkDto; now: number; onGo: (path: string) => void }) {
  const { zone, marks } = useFormats();
  const at = (instant: string) => moment(Date.parse(instant), zone, now, marks);
  const { repair, over } = work;
  const part = work.leftMinutes > 0 && work.leftMinutes < work.likelyMinutes;
  const facts: Fact[] = [
    ...(part ? [{ name: 'In nobody’s hands', value: workMinutes(work.leftMinutes, work.leftLongMinutes) }] : []),
    { name: 'Place', value: work.place?.name ?? 'any' },
    { name: 'Skill', value: work.skill?.name ?? 'none' },
    { name: 'Priority', value: workPriorityNames[work.priority] },
    ...(work.dueAt ? [{ name: 'Due', value: at(work.dueAt), note: isWorkLate(work, now) ? 'late' : undefined }] : []),
    { name: 'In parts', value: work.splittable ? 'yes' : 'no' },
  ];
  return (
    <View style={{ rowGap: 12 }}>
      <View style={{ flexDirection: 'row', alignItems: 'flex-end', columnGap: 12, flexWrap: 'wrap' }}>
        <Duration seconds={work.likelyMinutes * 60} precision="minute" kind="hero" />
        <Txt tone="ink2" style={{ paddingBottom: 10 }}>
          {`likely, at most ${workMinutes(work.longMinutes, work.longMinutes)}`}
        </Txt>
      </View>
      {over ? (
        <View>
          <Txt bold>{`${workStateNames[work.state]} by ${over.by.name}, ${at(over.at)}`}</Txt>
          {over.reason ? <Txt tone="ink2">{over.reason}</Txt> : null}
        </View>
      ) : null}
      <FactList facts={facts} />
      {repair ? (
        <Link
          title={`For ${repair.number}`}
          label={`Open the repair ${repair.number}`}
          href={`/repairs/${repair.id}`}
          onPress={() => onGo(`/repairs/${repair.id}`)}
        />
      ) : null}
      {work.note ? <Txt>{work.note}</Txt> : null}
      <Txt kind="small" tone="ink2">{`Added by ${firstName(work.createdBy.name)}, ${at(work.createdAt)}`}</Txt>
    </View>
  );
}
