import { View } from 'react-native';
import { ageShort } from '../format/clock';
import { useFormats } from '../format/formats';
import { ampHoursNumber, clipVolts, clipVoltsNumber, millivolts, voltsNumber } from '../format/quantities';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { stages } from '../stage/stages';
import { CapacityMark, capacityAxis } from './capacity-mark';
import { SpareColumn } from './spare-column';
import { presentVolts, readAt, stockMark, whereWords, type StockItem } from './spare-model';
import { apartVolts, capacityBandOf, isCapacityGuessed, readBeforeWords, sourceWords } from './spare-words';

const list = { h: 36, w: 12, gap: 4 };
const slim = { h: 36, w: 6, gap: 3 };

/** The stock on the desk: one row of 44 px each, types under their own heading. */
export function SpareTable({
  items,
  ratedAh,
  now,
  onOpen,
}: {
  items: readonly StockItem[];
  /** Rated capacity by type id, where it is known. */
  ratedAh: ReadonlyMap<string, number>;
  now: number;
  onOpen: (id: string) => void;
}) {
  const { zone, marks } = useFormats();
  const lowestOf = (item: StockItem) => Math.min(...presentVolts(item));
  /** One axis for all rows of a type, so that boxes under each other compare. */
  const axes = new Map(
    [...new Set(items.map(({ spare }) => spare.moduleTypeId))].map((typeId) => [
      typeId,
      capacityAxis([
        ...items
          .filter(({ spare }) => spare.moduleTypeId === typeId)
          .flatMap(({ spare }) => [capacityBandOf(spare).low, capacityBandOf(spare).high]),
        ...(ratedAh.has(typeId) ? [ratedAh.get(typeId) ?? 0] : []),
      ]),
    ]),
  );
  return (
    <Table
      label="Spares"
      rows={items}
      rowKey={({ spare }) => spare.id}
      rowHeight={44}
      onOpen={({ spare }) => onOpen(spare.id)}
      rowLabel={(item) => `${item.spare.label}, ${whereWords(item)}`}
      groupHeading={({ spare }, before) =>
        before?.spare.moduleTypeId === spare.moduleTypeId ? null : (
          <View style={{ flexDirection: 'row', alignItems: 'baseline', columnGap: 8 }}>
            <Txt bold heading={2}>
              {spare.typeName}
            </Txt>
            <Txt kind="small" tone="ink2">
              {spare.shelfVolts === null ? 'no shelf voltage' : `shelf voltage ${clipVolts(spare.shelfVolts, marks)}`}
            </Txt>
          </View>
        )
      }
      columns={[
        { key: 'label', title: 'Spare', width: 70, cell: ({ spare }) => <Txt kind="numS">{spare.label}</Txt> },
        { key: 'place', title: 'Place', width: 62, tone: 'ink2', cell: ({ spare }) => spare.shelfPlace ?? '–' },
        {
          key: 'groups',
          title: 'Groups',
          width: 76,
          cell: (item) => <SpareColumn item={item} size={item.spare.groupsInSeries > 4 ? slim : list} />,
        },
        {
          key: 'lowest',
          title: 'Lowest, V',
          numeric: true,
          width: 68,
          cell: (item) => {
            const lowest = lowestOf(item);
            if (!Number.isFinite(lowest)) return '–';
            const under = lowest < item.spare.floorVolts;
            return (
              <Txt kind="numXS" align="right" tone={under ? 'alarm' : 'ink'}>
                {under ? clipVoltsNumber(lowest, marks) : voltsNumber(lowest, marks)}
              </Txt>
            );
          },
        },
        {
          key: 'apart',
          title: 'Apart',
          numeric: true,
          width: 62,
          cell: (item) => (presentVolts(item).length > 0 ? millivolts(apartVolts(presentVolts(item))) : '–'),
        },
        {
          key: 'capacity',
          title: 'Capacity, Ah',
          share: 1,
          cell: ({ spare }) => {
            const axis = axes.get(spare.moduleTypeId);
            const band = capacityBandOf(spare);
            return (
              <View style={{ flexDirection: 'row', alignItems: 'center', columnGap: 12 }}>
                <View style={{ width: 104, flexShrink: 0 }}>
                  {axis ? (
                    <CapacityMark
                      {...band}
                      {...axis}
                      labelAh={ratedAh.get(spare.moduleTypeId) ?? null}
                      dashed={isCapacityGuessed(spare) || spare.capacitySource !== 'measured'}
                      width={104}
                    />
                  ) : null}
                </View>
                <Txt kind="numXS" align="right" style={{ width: 36, flexShrink: 0 }}>
                  {ampHoursNumber(spare.usedCapacityAh, marks)}
                </Txt>
                <Txt kind="small" tone="ink2" nowrap>
                  {`±${ampHoursNumber(band.high - band.likely, marks)}, ${isCapacityGuessed(spare) ? 'guessed' : sourceWords[spare.capacitySource].replace('off the ', '')}`}
                </Txt>
              </View>
            );
          },
        },
        {
          key: 'read',
          title: 'Read',
          numeric: true,
          width: 52,
          cell: (item) => {
            const at = readAt(item);
            return at === null ? '–' : readBeforeWords(item.spare) !== null ? 'again' : ageShort(at, zone, now);
          },
        },
        {
          key: 'state',
          title: 'State',
          width: 172,
          cell: (item) => {
            const mark = stockMark(item);
            if (mark === null)
              return (
                <Txt kind="small" tone="ink2" style={{ marginLeft: 29 }}>
                  {item.spare.where === 'fitted' ? 'fitted' : (readBeforeWords(item.spare) ?? 'on the shelf')}
                </Txt>
              );
            return (
              <View style={{ flexDirection: 'row', alignItems: 'center', columnGap: 8 }}>
                <StageTag stage={mark} text={item.spare.where === 'quarantine' ? 'Quarantine' : stages[mark].word} />
                {item.spare.where === 'charge' && item.spare.charge ? (
                  <Txt kind="small" tone="ink2" nowrap>
                    {item.spare.charge.title}
                  </Txt>
                ) : null}
              </View>
            );
          },
        },
      ]}
    />
  );
}
