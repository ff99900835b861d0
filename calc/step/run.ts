import type { TracePoint } from '../types';
import type { Laws } from './laws';
import type { SeriesLoop } from './series-loop';

/** How a stretch of one law ends. */
export type Ending =
  | { kind: 'target' | 'cutoff' | 'time-cap' }
  | { kind: 'group-limit'; branch: number }
  /** Another law takes over; null: whichever rules then. */
  | { kind: 'switch'; law: number | null }
  /** The current has died away before any stop. */
  | { kind: 'dead' };

export interface RunStops {
  /** Charge at which a rest-voltage stop is met, C; Infinity: none. */
  atCoulombs: number;
  /** Infinity-free: 0 means none. */
  cutoffAmps: number;
  /** Voltage of any one group under current, V; null: none. */
  groupVolts: number | null;
  maxSeconds: number;
}

/** Everything that changes while a step runs. */
export class Run {
  readonly classes: number;
  /** q and the class over-voltages, then the decays where they are needed. */
  y: number[];
  s = 0;
  /** Over-voltage and ohmic part of the energy at the module's terminals, W·s. */
  lossWs = 0;
  peakAmps = 0;
  /** Hand-overs between laws since the last that brought time. */
  idleSwitches = 0;
  readonly trace: TracePoint[] | null;

  constructor(
    readonly loop: SeriesLoop,
    readonly laws: Laws,
    readonly stops: RunStops,
    /** Groups and links, without leads. */
    readonly moduleOhm: number,
    /** The current may turn round (two modules through a resistor). */
    readonly signed: boolean,
    traced: boolean,
  ) {
    this.classes = loop.classTau.length;
    this.y = [0, ...loop.classStart];
    if (laws.decays) for (let c = 0; c < this.classes; c++) this.y.push(1);
    this.trace = traced ? [] : null;
  }

  /** Voltage under current at which a branch ends the step, counted in the current's direction. */
  get groupLevel(): number | null {
    return this.stops.groupVolts === null ? null : this.loop.sense * this.stops.groupVolts;
  }

  /** First branch at its limit under `amps`, or −1. */
  branchAtLimit(y: number[], amps: number): number {
    const level = this.groupLevel;
    if (level === null) return -1;
    for (let b = 0; b < this.loop.branchCount; b++) if (this.laws.branchTerminal(b, y, amps) >= level - 1e-9) return b;
    return -1;
  }

  moduleVolts(y: number[], amps: number): number {
    return this.laws.emf(y) + this.loop.sense * amps * this.moduleOhm;
  }

  record(s: number, y: number[], amps: number): void {
    if (!this.trace) return;
    const last = this.trace[this.trace.length - 1];
    const point: TracePoint = {
      s,
      amps: this.loop.sense * amps,
      terminalVolts: this.moduleVolts(y, amps),
      soc: this.loop.branchOfGroup.map((b) => this.loop.socOf(b, y[0]!)),
    };
    if (last && last.s === s && last.amps === point.amps) return;
    this.trace.push(point);
  }
}
