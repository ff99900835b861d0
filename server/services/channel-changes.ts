import type { ChannelInput } from '@/shared/contract/equipment';
import { Channel } from '../entities/channel';
import type { Charger } from '../entities/charger';
import { DomainError, invalid } from '../errors/domain-error';
import { newId } from './ids';

export interface ChannelChanges {
  /** Rows to save: changed, new and newly retired ones. */
  saved: Channel[];
  retiredIds: string[];
}

/**
 * What becomes of a charger's channels when they are to be as typed.
 *
 * A channel is one of the present ones by its id; a new one that takes the name of a retired channel of the same
 * charger is that channel again, so that its past charges stay with it.
 *
 * @param all every channel of the workshop, since a channel's name is unique in it
 * @throws DomainError 400 a name twice or an id of another charger, 409 a name of another charger's channel
 */
export function channelChanges(
  charger: Charger,
  typed: readonly ChannelInput[],
  all: readonly Channel[],
): ChannelChanges {
  refuseTwice(typed);
  const own = all.filter((channel) => channel.chargerId === charger.id);
  const kept = typed.map((input, index) => {
    const taken = all.find((channel) => channel.name === input.name && channel.chargerId !== charger.id);
    if (taken) throw takenElsewhere(index, input.name, taken.retired);
    const present = presentChannel(own, input, index);
    const row =
      present ??
      Object.assign(new Channel(), none, { id: newId(), workshopId: charger.workshopId, chargerId: charger.id });
    const { id: _id, ...typedColumns } = input;
    // What was left out stays as it is.
    const columns = Object.fromEntries(Object.entries(typedColumns).filter(([, value]) => value !== undefined));
    return Object.assign(row, columns, { retired: false });
  });
  const keptIds = new Set(kept.map((channel) => channel.id));
  refuseNameOfRetired(kept, own, keptIds);
  const retired = own.filter((channel) => !keptIds.has(channel.id) && !channel.retired);
  return {
    saved: [...kept, ...retired.map((channel) => Object.assign(channel, { retired: true }))],
    retiredIds: retired.map((channel) => channel.id),
  };
}

/** What may be left out of the form, as a new channel has it. */
const none = {
  displayStepAmps: null,
  leadsMeasured: null,
  deratingAboveCelsius: null,
  deratingPercent: null,
  dutyPercent: null,
  faultAt: null,
  faultSeen: null,
  faultById: null,
} satisfies Partial<Channel>;

function presentChannel(own: readonly Channel[], input: ChannelInput, index: number): Channel | undefined {
  if (input.id === undefined) return own.find((channel) => channel.retired && channel.name === input.name);
  const present = own.find((channel) => channel.id === input.id);
  if (!present) throw invalid({ [`channels.${index}.id`]: 'This channel is not one of this charger’s.' });
  return present;
}

function refuseTwice(typed: readonly ChannelInput[]): void {
  typed.forEach((input, index) => {
    if (typed.findIndex((other) => other.name === input.name) !== index)
      throw invalid({ [`channels.${index}.name`]: `${input.name} stands here twice. Each channel has its own name.` });
  });
}

/** A present channel renamed to what a retired one of the same charger is called. */
function refuseNameOfRetired(kept: readonly Channel[], own: readonly Channel[], keptIds: ReadonlySet<string>): void {
  kept.forEach((channel, index) => {
    if (own.some((other) => !keptIds.has(other.id) && other.name === channel.name))
      throw takenElsewhere(index, channel.name, true);
  });
}

function takenElsewhere(index: number, name: string, retired: boolean): DomainError {
  const sentence = retired
    ? `${name} is the name of a channel out of service. Choose another name.`
    : `There is a channel called ${name} already. Choose another name.`;
  return new DomainError(409, 'name_taken', sentence, { fields: { [`channels.${index}.name`]: sentence } });
}
