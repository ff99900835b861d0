import type { HoldingCharge, OpenHold } from '../repositories/open-holds.repository';

export interface ChannelHolder {
  charge: HoldingCharge;
  /** When it is likely to be free (epoch ms); null: nobody can say. */
  freeAt: number | null;
}

/**
 * Who holds each channel, and until when: by the channel's id, channels that nobody holds left out.
 *
 * A charge that is held back keeps its channels for nobody knows how long. Of several holds on one channel the running
 * one is named, and the last to end says when it is free.
 */
export function channelHolders(holds: readonly OpenHold[], now: number): Map<string, ChannelHolder> {
  const holders = new Map<string, ChannelHolder & { running: boolean }>();
  for (const { hold, charge } of holds) {
    const freeAt = freeInstant(hold, charge, now);
    const running = hold.state === 'running';
    const known = holders.get(hold.channelId);
    if (known === undefined) holders.set(hold.channelId, { charge, freeAt, running });
    else
      holders.set(hold.channelId, {
        charge: running && !known.running ? charge : known.charge,
        freeAt: known.freeAt === null || freeAt === null ? null : Math.max(known.freeAt, freeAt),
        running: running || known.running,
      });
  }
  return holders;
}

function freeInstant(hold: OpenHold['hold'], charge: HoldingCharge, now: number): number | null {
  if (charge.stage === 'held') return null;
  // Nothing flows any more: the clips come off as soon as somebody needs them.
  if (charge.stage === 'resting' || charge.stage === 'check-due' || charge.stage === 'ready') return now;
  const until = hold.toAt ?? charge.currentEndAt ?? charge.plannedLikelyAt - charge.minRestS * 1000;
  return Math.max(now, until);
}
