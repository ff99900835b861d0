import type { BoardDto } from '@/shared/contract/board';
import type { ChargeCardDto, Stage } from '@/shared/contract/charge';

/** The moment of the drawings: Tuesday 9 June, 13:42 in a workshop two hours before UTC. */
export const zone = 'Etc/GMT-2';
export const at = (clock: string): number => Date.parse(`2026-06-09T${clock}:00+02:00`);
export const now = at('13:42');
const iso = (clock: string): string => new Date(at(clock)).toISOString();

/** A charge on the wall; `ready` as early, likely, late clocks. */
export function card(
  title: string,
  stage: Stage,
  ready: [string, string, string] | null,
  more: Partial<ChargeCardDto> = {},
): ChargeCardDto {
  const band = ready && { early: iso(ready[0]), likely: iso(ready[1]), late: iso(ready[2]) };
  return {
    id: title,
    number: 'C-0001',
    title,
    repairRef: title,
    modulePosition: null,
    spare: { id: 's', label: 'S-0400' },
    typeName: '2-series 66 Ah',
    chargeLimitVolts: 4.2,
    dischargeLimitVolts: 3,
    channelNames: ['A1'],
    person: { id: 'ines', name: 'Ines Marlow' },
    stage,
    heldFrom: null,
    direction: 'charge',
    way: 'terminals',
    finish: 'on-the-mark',
    targetVolts: 3.96,
    toleranceVolts: 0.005,
    groups: [
      { volts: 3.9, reckoned: true, fromVolts: 3.65, clipVolts: null },
      { volts: 3.9, reckoned: true, fromVolts: 3.65, clipVolts: null },
    ],
    laggingGroup: null,
    lagVolts: 0,
    amps: 10,
    clipOnAt: iso('11:50'),
    startedAt: iso('11:50'),
    segments: [
      { kind: 'cc', from: iso('11:50'), to: iso('13:52') },
      { kind: 'taper', from: iso('13:52'), to: iso('14:25') },
      { kind: 'rest', from: iso('14:25'), to: iso('15:25') },
    ],
    ready: band,
    plannedReady: band ?? { early: iso('15:15'), likely: iso('15:30'), late: iso('15:55') },
    readyBy: null,
    taperAt: null,
    currentEndAt: null,
    checkDueAt: null,
    readyAt: null,
    overdueSince: null,
    heldAt: null,
    stoppedAt: null,
    lookIns: [],
    nextLookInAt: null,
    lastReadingAt: null,
    nextHand: null,
    rev: 1,
    ...more,
  };
}

/** The first six of the drawings, in the wall's order. */
export const six: ChargeCardDto[] = [
  card('R-2406', 'tapering', ['14:45', '14:55', '15:30'], {
    overdueSince: iso('13:20'),
    channelNames: ['B2'],
    person: { id: 'bram', name: 'Bram Teal' },
  }),
  card('R-2409', 'check-due', null, { checkDueAt: iso('13:30') }),
  card('R-2412', 'resting', ['14:18', '14:25', '14:50'], {
    channelNames: [],
    person: { id: 'suri', name: 'Suri Vance' },
  }),
  card('R-2411', 'charging', ['15:15', '15:30', '15:55'], { channelNames: ['A2'] }),
  card('R-2418', 'queued', ['16:40', '17:05', '18:05'], { channelNames: ['B1'] }),
  card('R-2415', 'discharging', ['16:55', '17:20', '18:05'], { direction: 'discharge', channelNames: ['C2'] }),
];

/** A board of so many charges: the six, then charging ones with a later finish each. */
export function boardOf(count: number, more: Partial<BoardDto> = {}): BoardDto {
  const others = Array.from({ length: Math.max(0, count - six.length) }, (_, i) => {
    const minute = 18 * 60 + 10 * i;
    const clock = (m: number) => `${String(Math.floor(m / 60)).padStart(2, '0')}:${String(m % 60).padStart(2, '0')}`;
    return card(`R-25${String(i).padStart(2, '0')}`, 'charging', [
      clock(minute - 15),
      clock(minute),
      clock(minute + 25),
    ]);
  });
  return {
    rev: 1,
    at: new Date(now).toISOString(),
    workshop: { id: 'w', name: 'Harbour Lane Traction', zone },
    charges: [...six, ...others].slice(0, count),
    channels: [
      { id: '1', name: 'A1', maxAmps: 10, chargeTitle: null },
      { id: '2', name: 'A2', maxAmps: 10, chargeTitle: null },
    ],
    next: null,
    openToday: { from: iso('08:00'), to: iso('18:00') },
    ...more,
  };
}
