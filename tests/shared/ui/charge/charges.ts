import type { PlanOption } from '@/calc/plan-types';
import type { ChargeDto, CheckItemDto, ReadingDto, Stage } from '@/shared/contract/charge';
import { at, card } from '../../../app/wall/cards';

export { at, card, now, zone } from '../../../app/wall/cards';
export const iso = (clock: string): string => new Date(at(clock)).toISOString();

export const option: PlanOption = {
  id: 'terminals over A2',
  way: 'terminals',
  finish: 'over-and-settle',
  direction: 'charge',
  channelIds: ['a2'],
  channelText: 'A2 · 10 A',
  amps: 10,
  steps: [
    {
      kind: 'bulk',
      way: 'terminals',
      channelIds: ['a2'],
      resistorId: null,
      groupIndexes: [0, 1, 2],
      direction: 'charge',
      startS: 300,
      stopS: 8460,
      setVolts: 11.927,
      setAmps: 10,
      ampHours: 22.6,
      wattHours: 260,
      endAmps: 10,
      voltageLimitAtS: null,
      restVoltsAfter: [3.906, 3.905, 3.902],
    },
  ],
  totalS: { p10: 12_000, p50: 13_200, p90: 14_700 },
  queueS: 0,
  currentStartS: 300,
  currentEndS: 8460,
  segments: [],
  trace: [],
  ampHours: 22.6,
  wattHours: 260,
  handsOnS: 900,
  busbarsOff: false,
  takes: 'Leads on the module’s own terminals.',
  endSpreadVolts: 0.004,
  endGroupVolts: [3.906, 3.905, 3.902],
  withinTolerance: true,
  setVolts: 11.927,
  setVoltsCap: 11.93,
  restS: 3600,
  latestStartS: null,
  tooLate: false,
  soonest: true,
  soonestBusbarsStay: true,
  dominant: 'capacity',
  narrowsByS: 600,
  cautions: [],
};

/** A charge of the drawings with all that its page shows. */
export function charge(stage: Stage, more: Partial<ChargeDto> = {}): ChargeDto {
  return {
    ...card('R-2411', stage, ['15:15', '15:30', '15:55'], {
      id: 'c1',
      number: 'C-0147',
      spare: { id: 's1', label: 'S-0398' },
      typeName: '3-series 78 Ah',
      channelNames: ['A2'],
      finish: 'over-and-settle',
      targetVolts: 3.905,
      groups: [3.855, 3.854, 3.849].map((volts) => ({
        volts,
        reckoned: true,
        fromVolts: volts - 0.2,
        clipVolts: volts + 0.041,
      })),
    }),
    option,
    channels: [{ id: 'ch-b2', name: 'B2', fault: null }],
    moduleTypeId: 't1',
    shelfPlace: 'D3',
    meterId: 'm1',
    targetCelsius: 21,
    targetSoc: null,
    targetTypedVolts: 3.906,
    topUpOf: null,
    wentOnAs: null,
    stopReason: null,
    minRestS: 3600,
    deliveredAh: 18.7,
    plannedAh: 22.6,
    stepIndex: 0,
    expected: { at: iso('13:36'), terminalVolts: 11.65, amps: 10, celsius: 23 },
    checks: [],
    startBlockedBy: null,
    planAgain: false,
    readings: [],
    restChecks: [],
    events: [],
    rest: null,
    odd: null,
    learned: { capacityAh: null, longOhm: null, leadOhm: null },
    dominant: null,
    createdAt: iso('11:30'),
    labelUrl: 'https://bidewell.example.com/charges/c1',
    ...more,
  };
}

export const reading = (clock: string, more: Partial<ReadingDto> = {}): ReadingDto => ({
  id: clock,
  at: iso(clock),
  terminalVolts: 11.64,
  amps: 10,
  celsius: 24,
  groupVolts: null,
  meterId: null,
  takenAt: null,
  by: { id: 'ines', name: 'Ines Marlow' },
  source: 'typed',
  replacedBy: null,
  replaces: null,
  reason: null,
  mayCorrect: true,
  ...more,
});

const titles = ['Isolation', 'Polarity', 'Condition', 'Temperature', 'Set voltage', 'Ventilation', 'Attendance'];
const codes = [
  'isolation',
  'polarity',
  'condition',
  'temperature',
  'ceiling',
  'ventilation',
  'attendance',
] as const satisfies CheckItemDto['code'][];

/** The seven checks, none answered but the temperature, which the numbers answer. */
export const checks = (change: Partial<Record<CheckItemDto['code'], Partial<CheckItemDto>>> = {}): CheckItemDto[] =>
  codes.map((code, index) => ({
    code,
    by: code === 'temperature' ? 'data' : 'person',
    title: titles[index]!,
    question: code === 'temperature' ? '21 °C, allowed 10–45 °C' : `${titles[index]}?`,
    detail: code === 'temperature' ? 'Answered from the reading at 13:37. Locked.' : `About ${code}.`,
    yes: code === 'temperature' ? '' : `Yes to ${code}`,
    no: code === 'temperature' ? '' : `No to ${code}`,
    answer: code === 'temperature' ? 'yes' : null,
    answeredBy: null,
    answeredAt: null,
    note: null,
    ...change[code],
  }));
