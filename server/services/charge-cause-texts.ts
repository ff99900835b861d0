/** What the alerts say that the rows of a charge call for by themselves (look: §8). */
import type { AlertText } from './charge-alert-texts';
import type { OverLimit, OverVoltage, Silence } from './charge-causes';
import { faultWords, type FaultOfCharge } from './channel-fault';
import type { ChargeFile } from './charge-file';
import { channelNamesOf, titleAtChannel } from './charge-steps';
import { ampsText, celsiusText, cellText, clipText, clockText, listText, titleOf } from './charge-words';

const stepOf = (file: ChargeFile): number => file.charge.reckoning?.reckoning.stepIndex ?? 0;
const channelsOf = (file: ChargeFile): string => listText(channelNamesOf(file, stepOf(file)));

export function taperText(file: ChargeFile, now: number): AlertText {
  const { charge, workshop } = file;
  const amps = Math.abs(charge.reckoning?.reckoning.amps ?? 0);
  const ready = charge.likelyAt === null ? '' : ` Ready at about ${clockText(charge.likelyAt, workshop.zone, now)}.`;
  const names = channelsOf(file);
  return {
    title: titleAtChannel(file, stepOf(file)),
    seen: `The current tapers, ${ampsText(amps)} are expected now.${ready}`,
    checkFirst: `Whether ${names === '' ? 'the meter' : names} shows less current than before, at the voltage it is set to.`,
  };
}

export function startMissedText(file: ChargeFile, since: number, now: number): AlertText {
  const { charge, workshop } = file;
  const at = (instant: number): string => clockText(instant, workshop.zone, now);
  const names = listText(channelNamesOf(file, 0));
  return {
    title: titleAtChannel(file, 0),
    seen: `It had to be clipped on by ${at(since)} to be ready by ${at(charge.readyBy ?? now)}.`,
    checkFirst: `${names === '' ? 'What it waits for' : `Whether ${names} is free`}, then clip on, plan it anew or tell who waits.`,
  };
}

export function noReadingText(file: ChargeFile, silence: Silence, now: number): AlertText {
  const names = channelsOf(file);
  const from = names === '' ? 'No reading' : `No reading from ${names}`;
  return {
    title: titleAtChannel(file, stepOf(file)),
    seen: `${from} since ${clockText(silence.lastAt, file.workshop.zone, now)}. Look in.`,
    checkFirst: `Warmth and smell, then what ${names === '' ? 'the meter' : names} shows in volts and amps. Log it.`,
  };
}

/** Somebody has called a channel out of order that this charge has, or is to have. */
export function channelFaultText(file: ChargeFile, { channel, flows }: FaultOfCharge, now: number): AlertText {
  const { name, faultAt, faultById } = channel;
  const who = file.people.get(faultById ?? '')?.name ?? 'Somebody';
  const seen = `${faultWords(channel)} ${who} said so at ${clockText(faultAt, file.workshop.zone, now)}.`;
  return {
    title: flows ? titleAtChannel(file, stepOf(file)) : titleOf(file.charge),
    seen,
    checkFirst: flows
      ? `That ${name} is off at the charger, then the clips and the module for warmth and smell, then hold or stop the charge.`
      : `Whether ${name} works again, then plan it on another channel.`,
  };
}

export function overTemperatureText(file: ChargeFile, over: OverLimit): AlertText {
  return {
    title: titleAtChannel(file, stepOf(file)),
    seen: `It has warmed to ${celsiusText(over.seen)}. This type may have ${celsiusText(over.limit)}.`,
    checkFirst: 'Hold the charge, then where it is warmest, the clips there, and whether it still warms.',
  };
}

export function overVoltageText(file: ChargeFile, over: OverVoltage): AlertText {
  const names = channelsOf(file);
  const seen =
    over.group === null
      ? `The clips read ${clipText(over.seen)}, over the limit of ${clipText(over.limit)}.`
      : `Group ${over.group + 1} reads ${cellText(over.seen)}, over the limit of ${cellText(over.limit)}.`;
  return {
    title: titleAtChannel(file, stepOf(file)),
    seen,
    checkFirst: `${names === '' ? 'Take the resistor off' : `Switch ${names} off`}, then the group with a second meter, then what ${names === '' ? 'was joined' : 'the channel is set to'}.`,
  };
}
