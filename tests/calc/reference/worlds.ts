import {
  chargeThroughTerminals,
  chemistryParameters,
  longResistance,
  resistanceTemperatureFactor,
  shiftCurve,
  socAtVolts,
  splitLongResistance,
  voltsAtSoc,
} from '@/calc/index';
import type { LiveReading } from '@/calc/live-types';
import type { PlanInput, PlanOption } from '@/calc/plan-types';
import type { CellGroup, OcvTable, StepInput, StepResult } from '@/calc/types';

/** Random numbers apart from the code under test: a linear congruential generator of 64 bits, its high word, and Box–Muller. */
export class Chance {
  private word: bigint;
  private spare: number | null = null;

  constructor(seed: number) {
    this.word = (BigInt(seed) * 0x9e3779b97f4a7c15n + 0x1234567n) & 0xffffffffffffffffn;
    for (let k = 0; k < 8; k += 1) this.uniform();
  }

  uniform(): number {
    this.word = (this.word * 6364136223846793005n + 1442695040888963407n) & 0xffffffffffffffffn;
    return (Number(this.word >> 32n) + 0.5) / 2 ** 32;
  }

  normal(): number {
    if (this.spare !== null) {
      const kept = this.spare;
      this.spare = null;
      return kept;
    }
    const radius = Math.sqrt(-2 * Math.log(this.uniform()));
    const angle = 2 * Math.PI * this.uniform();
    this.spare = radius * Math.sin(angle);
    return radius * Math.cos(angle);
  }
}

/** One standard deviation each, as the code states them; a test that draws a world draws from these. */
export interface WorldSpreads {
  capacityRelative: number;
  resistanceRelative: number;
  currentRelative: number;
  meterVolts: number;
  readingVolts: number;
  targetVolts: number;
  /** Of the charger's voltmeter, V between the clips. */
  chargerVolts: number;
  curveVolts: number;
  temperatureCelsius: number;
  leadRelative: number;
  terminalVolts: number;
  ammeterRelative: number;
  ammeterAmps: number;
  /** Of the one-RC model under current: of the long resistance, as a share, */
  modelRelative: number;
  /** of the curve, V a group, */
  modelVolts: number;
  /** and of the curve along its own axis, as a share of the capacity. */
  modelSoc: number;
  /** Width of the humps of the two, as a share of the capacity. */
  modelCorrelationSoc: number;
}

/** What the world is beside the spreads: where it is not the one that was planned for. */
export interface Twist {
  /** The whole curve is off by this, V a group, in place of what is drawn. */
  curveVolts?: number;
  /** The resistance under current and the curve's shape are off as the model's own spreads have them. */
  bent?: boolean;
  /** True lead resistance, ohm. */
  leadOhm?: number;
  /** A second, slow RC pair takes this share of the long resistance, with this time constant, s. */
  slow?: { share: number; tauS: number };
}

/** A charge as it truly goes: the §9 integrator on true parameters. */
export interface World {
  /** Seconds of current until it ends as the finish has it. */
  currentS: number;
  /** Readings of the charger's own display (volts where it senses) at these instants. */
  readAt: (times: readonly number[], chance: Chance) => LiveReading[];
  trueCapacityAh: number;
  trueLongOhm: number;
}

/**
 * Draws a world for a one-step charge through the terminals and runs it to its end: over and settle until the module truly
 * rests at the target, on the mark until the current has fallen to the planned end current.
 */
export function drawWorld(
  plan: PlanInput,
  option: PlanOption,
  spreads: WorldSpreads,
  chance: Chance,
  twist: Twist = {},
): World | null {
  const step = option.steps[0]!;
  const channel = plan.channels.find((one) => one.channelId === step.channelIds[0])!;
  const chemistry = chemistryParameters(plan.module.chemistry);
  const table = plan.module.curve ?? chemistry.curve;
  const count = plan.spare.groupVolts.length;
  const normal = (): number => chance.normal();

  const drawnOff = spreads.curveVolts * normal();
  const curveOff = twist.curveVolts ?? drawnOff;
  const meter = spreads.meterVolts * normal();
  const other = spreads.meterVolts * normal();
  const sameMeter = plan.spare.meterId !== null && plan.spare.meterId === plan.target.meterId;
  const targetMeter = sameMeter ? meter : other;
  const targetOff = spreads.targetVolts * normal();
  const capacityAh = (plan.spare.capacityAh as number) * Math.exp(spreads.capacityRelative * normal());
  const celsius = 25 + spreads.temperatureCelsius * normal();
  const longOhm =
    longResistance(plan.module.resistanceKind, plan.module.resistanceOhm!) *
    Math.exp(spreads.resistanceRelative * normal()) *
    resistanceTemperatureFactor(celsius);
  const currentFactor = Math.exp(spreads.currentRelative * normal());
  const chargerOff = spreads.chargerVolts * normal();
  const leadOhm =
    channel.senses === 'module'
      ? 0
      : (twist.leadOhm ?? channel.leadResistanceOhm * Math.exp(spreads.leadRelative * normal()));
  const ammeter = 1 + spreads.ammeterRelative * normal();
  const modelFactor = twist.bent ? Math.exp(spreads.modelRelative * normal()) : 1;

  // True rest volts are the table's less the offset; what a meter read is the true volts less its own offset.
  const startSoc = plan.spare.groupVolts.map((volts) =>
    socAtVolts(table, volts + spreads.readingVolts * normal() + meter + curveOff),
  );
  const targetSoc = socAtVolts(table, plan.target.volts + targetOff + targetMeter + curveOff);
  const trueCurve = shiftCurve(twist.bent ? bent(table, spreads, chance) : table, -curveOff);
  // Whoever reads the module at rest finds it on the table; bent is what the curve is under current.
  const endVolts = voltsAtSoc(trueCurve, targetSoc);
  const slowOhm = (twist.slow?.share ?? 0) * longOhm;
  const { ohmicResistanceOhm, polarisationResistanceOhm } = splitLongResistance(longOhm * modelFactor);
  const groups: CellGroup[] = startSoc.map((soc) => ({
    capacityAh,
    ohmicResistanceOhm,
    polarisationResistanceOhm: polarisationResistanceOhm - slowOhm,
    polarisationTimeConstantS: chemistry.polarisationTimeConstantS,
    restVolts: voltsAtSoc(trueCurve, soc),
  }));
  const onTheMark = option.finish === 'on-the-mark';
  const input: StepInput = {
    groups,
    curve: trueCurve,
    linkResistanceOhm: plan.module.linkResistanceOhm,
    coulombicEfficiency: 1,
    direction: 'charge',
    source: {
      maxAmps: step.setAmps! * currentFactor,
      setVolts: step.setVolts! + chargerOff,
      maxWatts: channel.maxWatts,
      leadResistanceOhm: leadOhm,
      heldGroupVolts: null,
      loadOhm: null,
    },
    stop: {
      relaxedVolts: onTheMark ? null : count * endVolts,
      toleranceVolts: 0,
      cutoffAmps: onTheMark ? Math.abs(step.endAmps) : null,
      groupVolts: null,
      // Nobody waits longer.
      maxSeconds: 40 * 3600,
    },
    settledVolts: 0.001,
  };
  const course = twist.slow ? withSlowPair(input, slowOhm, twist.slow.tauS) : plainCourse(input);
  if (course === null) return null;
  return {
    currentS: course.stopAtS,
    trueCapacityAh: capacityAh,
    trueLongOhm: longOhm,
    readAt: (times, noise) =>
      times.map((s) => {
        const { amps, moduleVolts } = course.at(s);
        const volts = moduleVolts + (channel.senses === 'module' ? 0 : amps * leadOhm) - chargerOff;
        return {
          s,
          terminalVolts: snapped(volts + spreads.terminalVolts * noise.normal(), channel.displayStepVolts),
          amps: amps * ammeter + spreads.ammeterAmps * noise.normal(),
          celsius: null,
          groupVolts: null,
          ...(channel.senses === 'module' ? {} : { takenAt: 'supply' as const }),
        };
      }),
  };
}

/** A curve whose shape between start and end is not the table's: humps as the spreads have them, up and along its axis. */
function bent(table: OcvTable, spreads: WorldSpreads, chance: Chance): OcvTable {
  // The code forgets an error by e^(−Δz/L); a smooth one of this width forgets itself over the same charge (equal integrals).
  const width = spreads.modelCorrelationSoc / Math.sqrt(Math.PI / 2);
  const up = smoothNoise(width, chance);
  const along = smoothNoise(width, chance);
  const soc = Array.from({ length: 51 }, (_, at) => at / 50);
  const volts = soc.map((z) => voltsAtSoc(table, z + spreads.modelSoc * along(z)) + spreads.modelVolts * up(z));
  const rises = volts.every((one, at) => at === 0 || one > volts[at - 1]!);
  return rises ? { soc, volts } : bent(table, spreads, chance);
}

/** A standard normal number that changes smoothly over z: its correlation is exp(−Δz²/2width²), by random waves. */
function smoothNoise(width: number, chance: Chance): (z: number) => number {
  const waves = Array.from({ length: 24 }, () => ({
    per: chance.normal() / width,
    phase: 2 * Math.PI * chance.uniform(),
  }));
  const size = Math.sqrt(2 / waves.length);
  return (z) => size * waves.reduce((sum, { per, phase }) => sum + Math.cos(per * z + phase), 0);
}

const snapped = (volts: number, step: number): number => (step > 0 ? Math.round(volts / step) * step : volts);

interface Course {
  stopAtS: number;
  at: (s: number) => { amps: number; moduleVolts: number };
}

function plainCourse(input: StepInput): Course | null {
  const whole = chargeThroughTerminals(input);
  if (whole.outcome === 'unreachable' || whole.outcome === 'time-cap') return null;
  let last: { s: number; state: CellGroup[] } = { s: 0, state: input.groups };
  const stepTo = (s: number): StepResult => {
    if (s < last.s) last = { s: 0, state: input.groups };
    const result = chargeThroughTerminals({
      ...input,
      groups: last.state,
      stop: { relaxedVolts: null, toleranceVolts: 0, cutoffAmps: null, groupVolts: null, maxSeconds: s - last.s },
    });
    last = {
      s,
      state: result.groups.map((group, at) => ({
        ...input.groups[at]!,
        restVolts: voltsAtSoc(input.curve, group.soc),
        polarisationVolts: group.polarisationVolts,
      })),
    };
    return result;
  };
  return {
    stopAtS: whole.stopAtS,
    at: (s) => {
      const result = stepTo(s);
      return {
        amps: result.endAmps,
        moduleVolts: result.endTerminalVolts,
      };
    },
  };
}

/** Two RC pairs, which the integrator does not have: straight Euler steps of two seconds, ends found to the step. */
function withSlowPair(input: StepInput, slowOhm: number, slowTauS: number): Course | null {
  const { groups, source, stop, curve } = input;
  const dt = 2;
  const soc = groups.map((group) => socAtVolts(curve, group.restVolts));
  const fast = groups.map(() => 0);
  const slow = groups.map(() => 0);
  const ohm =
    groups.reduce((sum, group) => sum + group.ohmicResistanceOhm, 0) +
    input.linkResistanceOhm +
    source.leadResistanceOhm;
  const points: { amps: number; moduleVolts: number }[] = [];
  for (let s = 0; s < (stop.maxSeconds ?? 1e6); s += dt) {
    const rest = soc.reduce((sum, z) => sum + voltsAtSoc(curve, z), 0);
    const emf = rest + fast.reduce((sum, one, at) => sum + one + slow[at]!, 0);
    const amps = Math.max(0, Math.min(source.maxAmps!, (source.setVolts! - emf) / ohm));
    points.push({ amps, moduleVolts: emf + amps * (ohm - source.leadResistanceOhm) });
    if (stop.relaxedVolts !== null && rest >= stop.relaxedVolts) return courseOf(points, dt, s);
    if (stop.cutoffAmps != null && amps <= stop.cutoffAmps) return courseOf(points, dt, s);
    groups.forEach((group, at) => {
      soc[at]! += (amps * dt) / (3600 * group.capacityAh);
      fast[at]! += ((amps * group.polarisationResistanceOhm - fast[at]!) * dt) / group.polarisationTimeConstantS;
      slow[at]! += ((amps * slowOhm - slow[at]!) * dt) / slowTauS;
    });
  }
  return null;
}

const courseOf = (points: { amps: number; moduleVolts: number }[], dt: number, stopAtS: number): Course => ({
  stopAtS,
  at: (s) => points[Math.min(points.length - 1, Math.round(s / dt))]!,
});
