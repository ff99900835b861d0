import { View } from 'react-native';
import type { RepairCardDto } from '@/shared/contract/repair';
import { repairStepNames } from '@/shared/contract/repair-steps';
import { firstName, markOf, readyOf, type CardClock } from '../charge/card-model';
import { moment, readyAt, readyBounds } from '../format/clock';
import { useFormats } from '../format/formats';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { freshTone } from '../states/stale';
import { signOf, stepsOfCard, vehicleAndBay, waitsFor } from './repair-words';
import { StepBars } from './step-strip';

export interface RepairsShown {
  cards: readonly RepairCardDto[];
  at: CardClock;
  /** The link is down: figures turn grey. */
  old?: boolean;
  onOpen: (id: string) => void;
}

/** It is late: its promise is over, or its charge is overdue. */
export const isLate = (card: RepairCardDto, now: number): boolean =>
  card.state === 'open' && card.promisedAt !== null && Date.parse(card.promisedAt) < now;

/** The repairs of the desk: what needs somebody first. Arrow keys walk the rows, Enter opens. */
export function RepairTable({ cards, at, old = false, onOpen }: RepairsShown) {
  const { zone, marks } = useFormats();
  const moments = (instant: string) => moment(Date.parse(instant), zone, at.now, marks);
  return (
    <Table
      label="Repairs"
      rows={cards}
      rowKey={({ id }) => id}
      rowHeight={56}
      onOpen={({ id }) => onOpen(id)}
      rowLabel={(card) => rowLabel(card, moments, at.now)}
      rowTone={(card) => (card.charge?.overdueSince ? 'alarmTint' : null)}
      columns={[
        {
          key: 'number',
          title: 'Repair',
          width: 84,
          cell: ({ number }) => (
            <Txt kind="numM" nowrap>
              {number}
            </Txt>
          ),
        },
        { key: 'vehicle', title: 'Vehicle, place', share: 1.3, tone: 'ink2', cell: vehicleAndBay },
        {
          key: 'step',
          title: 'Step of 7',
          width: 226,
          cell: (card) => (
            <View style={{ flexDirection: 'row', alignItems: 'center', columnGap: 12 }}>
              <StepBars small steps={stepsOfCard(card)} mark={card.charge ? markOf(card.charge) : null} />
              <Txt kind="small">{card.step === null ? 'Handed over' : repairStepNames[card.step]}</Txt>
            </View>
          ),
        },
        {
          key: 'stage',
          title: 'Stage',
          width: 140,
          cell: (card) => {
            const sign = signOf(card);
            return sign ? <StageTag stage={sign.mark} text={sign.word} /> : '–';
          },
        },
        { key: 'waits', title: 'What it waits for', share: 1.6, cell: (card) => waitsFor(card, moments, at.now) },
        {
          key: 'ready',
          title: 'Module ready',
          width: 148,
          cell: (card) => {
            const ready = card.charge ? readyOf(card.charge, at) : null;
            return ready ? (
              // The band goes under the time where a clock of twelve hours makes both too long for one line.
              <View style={{ flexDirection: 'row', flexWrap: 'wrap', alignItems: 'baseline', columnGap: 6 }}>
                <Txt kind="numS" nowrap tone={freshTone(old)}>
                  {readyAt(ready, zone, at.now, marks)}
                </Txt>
                <Txt kind="small" tone="ink2" nowrap>{`(${readyBounds(ready, zone, at.now, marks)})`}</Txt>
              </View>
            ) : (
              ''
            );
          },
        },
        {
          key: 'due',
          title: 'Due',
          width: 92,
          numeric: true,
          cell: (card) =>
            card.promisedAt ? (
              <Txt kind="numXS" nowrap tone={isLate(card, at.now) ? 'alarm' : 'ink'}>
                {moments(card.promisedAt)}
              </Txt>
            ) : (
              ''
            ),
        },
        {
          key: 'with',
          title: 'With',
          width: 76,
          cell: ({ people, state }) =>
            people[0] ? (
              firstName(people[0].name)
            ) : state === 'open' ? (
              <Txt tone="alarm" bold>
                nobody
              </Txt>
            ) : (
              ''
            ),
        },
      ]}
    />
  );
}

/** What a reader hears of a row. */
export function rowLabel(card: RepairCardDto, at: (instant: string) => string, now: number): string {
  const step = card.step === null ? 'handed over' : `step ${repairStepNames[card.step]}`;
  return [
    card.number,
    vehicleAndBay(card),
    step,
    signOf(card)?.word ?? '',
    waitsFor(card, at, now),
    card.promisedAt ? `due ${at(card.promisedAt)}` : '',
  ]
    .filter(Boolean)
    .join(', ');
}
