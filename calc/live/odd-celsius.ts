import type { PlanModel } from '../plan/plan-model';
import { slopesOf } from './live-facts';
import { LIVE_SPREADS } from './live-spreads';
import type { Observation } from './observations';
import { ODD_OFF, type OddLook } from './odd-run';
import type { ParticleSet } from './particle-set';

/** The first temperature of the charge, which later ones are held against. */
export interface WarmFrom {
  s: number;
  celsius: number;
  ownHeatKelvin: number;
}

/**
 * Warmer than the current's own heat and the room make it. Held against the first reading of the charge and not against what
 * was learned since: a slow rise would teach itself away.
 */
export function oddCelsius(model: PlanModel, set: ParticleSet, at: Observation, from: WarmFrom | null): OddLook | null {
  const { celsius } = at.kept.reading;
  if (celsius === null) return null;
  const start = from ?? { s: 0, celsius: model.basis.celsius, ownHeatKelvin: 0 };
  const room = model.input.celsius;
  const fromRoom = Math.max(0, room - start.celsius) * (1 - Math.exp(-(at.kept.s - start.s) / LIVE_SPREADS.roomS));
  const expected = start.celsius + (at.ownHeatKelvin - start.ownHeatKelvin) + fromRoom;
  const startSd =
    from === null
      ? model.spreads.temperatureCelsius * Math.sqrt(set.moments(slopesOf({ temperature: 1 })).variance)
      : LIVE_SPREADS.celsius;
  const off = (celsius - expected) / Math.hypot(startSd, LIVE_SPREADS.celsius, LIVE_SPREADS.celsiusDrift);
  if (off < ODD_OFF) return null;
  return { kind: 'too-warm', quantity: 'celsius', group: null, seen: celsius, expected, off };
}
