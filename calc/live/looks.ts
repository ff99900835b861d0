import { slopeAtSoc } from '../curve/ocv';
import type { PlanModel } from '../plan/plan-model';
import { chargerSd } from '../plan/sample-run';
import { leadSlopes, NO_PLACE, slopesOf, wholePlace, type LiveFacts, type Residual } from './live-facts';
import { LIVE_SPREADS } from './live-spreads';
import type { Circuit, Observation } from './observations';
import type { Look } from './particle-set';

/** A look at the voltage between the clips. */
export interface TerminalLook extends Look {
  volts: number;
}

/** What changes from one look to the next. */
export interface Since {
  /** Share of the model's error that is left since the last look at a voltage. */
  keptVolts: number;
  /** The same for the curve's error, which cannot jump: smooth over the charge. */
  smoothVolts: number;
  /** Share of the thermometer's that is left. */
  keptCelsius: number;
}

/** A current this near to the full one is that one. */
const FULL_SHARE = 0.97;

/** A current this near to what a warm charger gives is that, as a share of it. */
const DERATED_SHARE = 0.05;

/** What the curve may be off along its own axis at a state of charge, as a share of the capacity. */
const curveAxisSd = (soc: number): number =>
  LIVE_SPREADS.emptySoc * Math.exp(-Math.max(0, soc) / LIVE_SPREADS.emptySocWidth);

/** What the source gives where no voltage limit rules, A: as set, or where that is what was read what it gives when warm. */
function fullNear({ fullAmps, channel, knot }: Circuit, amps: number): number | null {
  const warm = channel.derating && !knot.tapering ? channel.maxAmps * channel.derating.ampsShare : Infinity;
  return fullAmps !== null && warm < fullAmps && Math.abs(amps / warm - 1) <= DERATED_SHARE ? warm : fullAmps;
}

/** The source gives what it is set to, to a step of its display, or what it has when warm: no voltage limit rules. */
export function isFull(circuit: Circuit, amps: number): boolean {
  const full = fullNear(circuit, amps);
  return full === null || amps >= FULL_SHARE * full - (circuit.channel.displayStepAmps ?? 0);
}

/** The looks that one reading gives, as the samples see them. */
export class Looks {
  /** @param ripple variance of the current between two looks, as a share of it, by reading */
  constructor(
    private readonly model: PlanModel,
    private readonly facts: LiveFacts,
    private readonly ripple: ReadonlyMap<Observation, number>,
  ) {}

  /** What was read less the mean volts of a group at the module under a current. */
  private lessModule(
    read: number,
    observation: Observation,
    circuit: Circuit,
    slopes: Parameters<typeof slopesOf>[0],
  ): Residual {
    const { groups, shares, lane, knot, ohmicOhm } = circuit;
    const over = groups.reduce((sum, group, at) => sum + shares[at]! * observation.over[group]!, 0);
    return {
      read: read - (circuit.unevenVolts + lane.sign * knot.amps * circuit.linkOhm),
      ...this.facts.at(circuit, observation.movedAh),
      slopes: slopesOf({ curveVolts: 1, resistance: -(over + lane.sign * knot.amps * ohmicOhm), ...slopes }),
    };
  }

  /** What the model may be off by the over-voltage of this current, V a group: all of it may jump with the current. */
  overSd({ over }: Observation, { groups, shares, lane, knot, ohmicOhm }: Circuit): number {
    const through = groups.reduce(
      (sum, group, at) => sum + shares[at]! * over[group]!,
      lane.sign * knot.amps * ohmicOhm,
    );
    return Math.hypot(LIVE_SPREADS.modelRelative * through, LIVE_SPREADS.modelVolts);
  }

  /** What the model may be off under this current, V a group: by its over-voltage and by the curve along its own axis. */
  modelSd(observation: Observation, circuit: Circuit): number {
    const { groups, shares, knot } = circuit;
    const soc = groups.reduce((sum, group, at) => sum + shares[at]! * knot.state.soc[group]!, 0);
    return Math.hypot(this.overSd(observation, circuit), curveAxisSd(soc) * slopeAtSoc(this.model.curve, soc));
  }

  /**
   * The voltage between the clips at the current that flows; in a taper whose volts nobody has read it is the set voltage,
   * which the charger holds.
   */
  terminal(observation: Observation, circuit: Circuit, since: Since): TerminalLook | null {
    const { kept } = observation;
    const { channel, count, lane, knot } = circuit;
    const { model } = this;
    const { amps } = knot;
    const held =
      kept.reading.terminalVolts === null && kept.amps !== null && !knot.noCurrent && !isFull(circuit, kept.amps);
    const volts = kept.reading.terminalVolts ?? (held ? lane.step.setVolts : null);
    if (volts === null) return null;
    const byHand = !held && kept.reading.takenAt === 'module' && kept.reading.meterId != null;
    const spare = byHand && kept.reading.meterId === model.input.spare.meterId;
    const meter = byHand
      ? { spareMeter: spare ? model.spreads.meterVolts / count : 0 }
      : { chargerMeter: chargerSd(model, channel, count) / count };
    const perOhm = (-lane.sign * amps) / count;
    const leads = leadSlopes(channel);
    const throughLeads = { leads: perOhm * leads.leads, unknownLeadOhm: perOhm * leads.unknownLeadOhm };
    const place = held
      ? channel.senses === 'module'
        ? 'module'
        : 'supply'
      : (kept.reading.takenAt ?? (channel.senses === 'module' ? 'module' : null));
    const y = volts / count;
    const ohm = circuit.ohmicOhm + circuit.linkOhm;
    const ammeter = LIVE_SPREADS.ammeterAmps * ohm;
    const digit = Math.hypot(LIVE_SPREADS.terminalVolts, channel.displayStepVolts / Math.sqrt(12)) / count;
    const unknownMeter = byHand && !spare ? model.spreads.meterVolts / count : 0;
    // Volts without amps stand on the amps that are due.
    const guessed = kept.amps === null ? model.spreads.currentRelative * amps * ohm : 0;
    const atModule = (): Residual => this.lessModule(y, observation, circuit, meter);
    const atSupply = (): Residual => this.lessModule(y, observation, circuit, { ...meter, ...throughLeads });
    return {
      memory: 'volts',
      residual: place === 'module' ? atModule() : atSupply(),
      ...(place === null && amps > 0 ? { otherResidual: atModule() } : {}),
      sharedSd: this.modelSd(observation, circuit),
      kept: since.keptVolts,
      keptSmooth: since.smoothVolts,
      ownVariance: ammeter ** 2 + digit ** 2 + unknownMeter ** 2 + guessed ** 2,
      volts,
    };
  }

  /** The mean of the groups' voltages, read at the groups; at rest without the model's error under current. */
  groupMean(observation: Observation, since: Since): Look | null {
    const { kept, circuit, atRest } = observation;
    const volts = kept.reading.groupVolts;
    const { model } = this;
    if (volts === null || volts.length !== model.groups.length || volts.length === 0) return null;
    const whole = circuit !== null && circuit.groups.length === volts.length && circuit.lane.step.way === 'terminals';
    if (!whole && !atRest) return null;
    const y = volts.reduce((sum, one) => sum + one, 0) / volts.length;
    const known = kept.reading.meterId != null && kept.reading.meterId === model.input.spare.meterId;
    const spareMeter = known ? model.spreads.meterVolts : 0;
    const ownVariance = model.spreads.readingVolts ** 2 / volts.length + (known ? 0 : model.spreads.meterVolts ** 2);
    if (whole) {
      return {
        memory: 'volts',
        residual: this.lessModule(y, observation, { ...circuit, linkOhm: 0 }, { spareMeter }),
        sharedSd: this.modelSd(observation, circuit),
        kept: since.keptVolts,
        ownVariance,
      };
    }
    const over = observation.over.reduce((sum, one) => sum + one, 0) / volts.length;
    const wide = LIVE_SPREADS.restOverRelative * Math.abs(over);
    return {
      memory: 'rest',
      residual: {
        read: y,
        ...this.facts.at(wholePlace(model), observation.movedAh),
        slopes: slopesOf({ curveVolts: 1, resistance: -over, spareMeter }),
      },
      sharedSd: Math.hypot(wide, LIVE_SPREADS.restVolts),
      kept: 1,
      ownVariance,
    };
  }

  /** The current while no voltage limit rules, as a share of what is set. */
  amps(observation: Observation): Look | null {
    const { kept, circuit } = observation;
    if (kept.amps === null || circuit === null) return null;
    const set = fullNear(circuit, kept.amps);
    if (set === null) return null;
    const digitAmps = (circuit.channel.displayStepAmps ?? 0) / Math.sqrt(12);
    return {
      memory: 'amps',
      residual: { read: kept.amps / set, ...NO_PLACE, slopes: slopesOf({ current: -1 }) },
      sharedSd: LIVE_SPREADS.ammeterRelative,
      kept: 1,
      ownVariance: (LIVE_SPREADS.ammeterAmps / set) ** 2 + (digitAmps / set) ** 2 + (this.ripple.get(observation) ?? 0),
    };
  }

  /** The module's temperature, its own warmth taken off. */
  celsius({ kept, ownHeatKelvin }: Observation, since: Since): Look | null {
    const { celsius } = kept.reading;
    if (celsius === null) return null;
    const { basis, spreads } = this.model;
    return {
      memory: 'celsius',
      residual: {
        read: celsius - ownHeatKelvin - basis.celsius,
        ...NO_PLACE,
        slopes: slopesOf({ temperature: -spreads.temperatureCelsius }),
      },
      sharedSd: LIVE_SPREADS.celsiusDrift,
      kept: since.keptCelsius,
      ownVariance: LIVE_SPREADS.celsius ** 2,
    };
  }
}
