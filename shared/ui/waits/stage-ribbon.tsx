import { View } from 'react-native';
import type { WaitStage, WaitStageDto } from '@/shared/contract/waits';
import { ChartFrame } from '../charts/chart-frame';
import { duration } from '../format/duration';
import { fixed } from '../format/number';
import { Duration } from '../primitives/num';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { WaitRibbon } from '../wait-ribbon/wait-ribbon';
import { stageLabelPlaces } from './stage-label-places';
import { useWidth } from './use-width';
import { stageNames } from '@/shared/contract/wait-names';
import { fewWords } from './wait-words';

const kinds = { queue: 'queue', charging: 'cc', tapering: 'taper', resting: 'rest', 'check-due': 'check' } as const;

/** Where the middle wait goes, as the ribbon of one charge; a row of its table opens the charges that had the stage. */
export function StageRibbon({
  stages,
  onStage,
  onCsv,
}: {
  stages: readonly WaitStageDto[];
  onStage: (stage: WaitStage) => void;
  onCsv?: (() => void) | undefined;
}) {
  const { width, onLayout } = useWidth();
  // A middle of fewer than five would be drawn as if it were one.
  const drawn = stages.filter(({ few }) => !few);
  const left = stages.filter(({ few }) => few).map(({ stage }) => stageNames[stage]);
  const total = drawn.reduce((sum, stage) => sum + stage.medianS, 0);
  const begins = drawn.map((_, index) => drawn.slice(0, index).reduce((sum, stage) => sum + stage.medianS, 0));
  return (
    <View onLayout={onLayout}>
      <ChartFrame
        heading="Where the middle wait goes"
        note={`Middle value of each stage; they need not add up.${left.length > 0 ? ` Not drawn, ${fewWords}: ${left.join(', ')}.` : ''}`}
        {...(onCsv ? { onCsv } : {})}
        picture={
          width === 0 || total <= 0 ? null : (
            <View style={{ rowGap: 8 }}>
              <WaitRibbon
                segments={drawn.map((stage, index) => ({
                  kind: kinds[stage.stage],
                  fromS: begins[index] ?? 0,
                  toS: (begins[index] ?? 0) + stage.medianS,
                }))}
                fromS={0}
                toS={total}
                nowS={total}
                nowMark={false}
                width={width}
                height={64}
                twin={drawn
                  .map(({ stage, medianS }) => `${stageNames[stage]} ${duration(medianS, 'minute')}`)
                  .join(', ')}
              />
              <StageLabels stages={drawn} begins={begins.map((begin) => (begin / total) * width)} width={width} />
            </View>
          )
        }
        table={<StageTable stages={stages} onStage={onStage} />}
      />
    </View>
  );
}

const StageTable = ({ stages, onStage }: { stages: readonly WaitStageDto[]; onStage: (stage: WaitStage) => void }) => (
  <Table
    label="Waits by stage"
    rows={stages}
    rowKey={({ stage }) => stage}
    rowLabel={({ stage }) => `Open the charges of ${stageNames[stage]}`}
    onOpen={({ stage }) => onStage(stage)}
    columns={[
      { key: 'stage', title: 'Stage', phone: 'name', share: 2, cell: ({ stage }) => stageNames[stage] },
      { key: 'charges', title: 'Charges', numeric: true, phone: 'none', cell: ({ charges }) => String(charges) },
      { key: 'hours', title: 'Hours', numeric: true, phone: 'none', cell: ({ waitHours }) => fixed(waitHours, 1) },
      {
        key: 'median',
        title: 'Half under',
        numeric: true,
        phone: 'value',
        cell: ({ few, medianS }) => (few ? 'fewer than 5' : duration(medianS, 'minute')),
      },
      {
        key: 'p90',
        title: '9 of 10 under',
        numeric: true,
        phone: 'none',
        cell: ({ few, p90S }) => (few ? '–' : duration(p90S, 'minute')),
      },
    ]}
  />
);

function StageLabels({
  stages,
  begins,
  width,
}: {
  stages: readonly WaitStageDto[];
  begins: readonly number[];
  width: number;
}) {
  const places = stageLabelPlaces(begins, width);
  return (
    <View style={places ? { height: 48 } : { flexDirection: 'row', flexWrap: 'wrap', columnGap: 20, rowGap: 6 }}>
      {stages.map((stage, i) => (
        <View key={stage.stage} style={places ? { position: 'absolute', left: places[i] } : { flexGrow: 1 }}>
          <Txt kind="small" tone="ink2">
            {stageNames[stage.stage]}
          </Txt>
          <Duration seconds={stage.medianS} precision="minute" kind="numS" />
        </View>
      ))}
    </View>
  );
}
