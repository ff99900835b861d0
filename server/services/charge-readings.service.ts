import { channelNamesOf } from './charge-steps';
import { groupCountProblem, groupVoltsProblem } from '@/shared/contract/group-volts';
import type { ChargeDto, ReadingInput } from '@/shared/contract/charge';
import { ampsProblem } from '@/shared/contract/reading-amps';
import type { Deps, Member } from '../deps';
import type { ChargeReading } from '../entities/charge-reading';
import { conflict, forbidden, invalid, notFound } from '../errors/domain-error';
import { insertReading, updateReading } from '../repositories/charge-rows.repository';
import { mayCorrect, readingDto } from './charge-dto';
import { actInstant } from './charge-instants';
import { isOpen, isUnderWay } from './charge-stages';
import { wrongStage } from './charge-stage-conflict';
import { markVisit } from './charge-visit';
import { ampsText, bare, celsiusText, cellText, clipText, clockText, listText } from './charge-words';
import { changeCharge, type ChargeWrite } from './charge-write';
import { newId } from './ids';
import { MOST_TIMES_PLANNED, SUPPLY_SLACK, UNDER_CURRENT_OVER_LIMIT_VOLTS } from './reading-bounds';

type ReadingValues = Pick<ChargeReading, 'terminalVolts' | 'amps' | 'celsius' | 'groupVolts' | 'meterId' | 'takenAt'>;

/**
 * Logs a reading; late ones are sorted in by their time. Whoever reads has looked in.
 * @throws DomainError 409 where the charge is not under way, 400 with the sentence per number that cannot be
 */
export function logReading(
  deps: Deps,
  member: Member,
  id: string,
  input: ReadingInput,
  now: number,
): Promise<ChargeDto> {
  return changeCharge(deps, member, id, null, now, async (write) => {
    const { manager, file } = write;
    const { charge } = file;
    if (!isUnderWay(charge.stage)) throw wrongStage(write, 'Readings belong to a charge that is under way.');
    const at = actInstant(file, input.at, now, { at: charge.startedAt ?? now, name: 'the start' });
    const reading = readingRow(write, at, plausible(write, input));
    await insertReading(manager, reading);
    file.readings.push(reading);
    await markVisit(write, at, readingText(reading));
    write.note('reading', `${readingText(reading)}.${tooWarm(write, reading)}`, at);
  });
}

/**
 * Puts a corrected reading in the place of a mistyped one, which is kept. Everything is reckoned anew from it.
 * @throws DomainError 403 for somebody who is neither its writer nor may correct anybody's, 409 where it was corrected already
 */
export function correctReading(
  deps: Deps,
  member: Member,
  id: string,
  readingId: string,
  input: ReadingInput & { reason?: string | null },
  now: number,
): Promise<ChargeDto> {
  return changeCharge(deps, member, id, null, now, async (write) => {
    const { manager, file } = write;
    const { charge, people } = file;
    const old = file.readings.find((one) => one.id === readingId);
    if (!old) throw notFound('This reading');
    if (!isOpen(charge.stage)) throw wrongStage(write, 'Its readings are closed.');
    if (old.replacedById !== null) {
      const standing = file.readings.find((one) => one.id === old.replacedById);
      throw conflict(
        'corrected_already',
        'This reading was corrected already. Correct the one that stands in its place.',
        standing && readingDto(file, standing, member),
      );
    }
    if (!mayCorrect(file, old, member))
      throw forbidden(
        `${people.get(old.personId)?.name ?? 'Somebody else'} has written this reading. Its writer or a foreman corrects it.`,
      );
    const given = input.at === undefined ? new Date(old.at).toISOString() : input.at;
    const at = actInstant(file, given, now, { at: charge.startedAt ?? now, name: 'the start' });
    const reading = {
      ...readingRow(write, at, plausible(write, { ...input, takenAt: input.takenAt ?? old.takenAt })),
      replacesId: old.id,
      reason: input.reason ?? null,
    };
    await insertReading(manager, reading);
    await updateReading(manager, charge.workshopId, old.id, { replacedById: reading.id });
    old.replacedById = reading.id;
    file.readings.push(reading);
    const why = input.reason ? ` ${bare(input.reason)}.` : '';
    const when = clockText(old.at, file.workshop.zone, now);
    write.note('corrected', `Reading of ${when} corrected: ${readingText(old)}, now ${readingText(reading)}.${why}`);
  });
}

const readingRow = ({ file, member, now }: ChargeWrite, at: number, values: ReadingValues): ChargeReading => ({
  id: newId(),
  workshopId: file.charge.workshopId,
  chargeId: file.charge.id,
  at,
  ...values,
  personId: member.personId,
  source: 'typed',
  replacesId: null,
  replacedById: null,
  reason: null,
  createdAt: now,
});

/** The numbers as they are kept, each believed to be possible here. */
function plausible(write: ChargeWrite, input: ReadingInput): ReadingValues {
  const { file } = write;
  const fields: Record<string, string> = {};
  const volts = terminalProblem(write, input.terminalVolts);
  if (volts !== null) fields.terminalVolts = volts;
  const amps = signedAmps(write, input.amps, fields);
  Object.assign(fields, groupProblems(write, input.groupVolts ?? null));
  if (input.meterId && !file.meters.has(input.meterId))
    fields.meterId = 'This meter is not on the list. Choose another.';
  if (Object.keys(fields).length > 0) throw invalid(fields);
  return {
    terminalVolts: input.terminalVolts,
    amps,
    celsius: input.celsius,
    groupVolts: input.groupVolts ?? null,
    meterId: input.meterId ?? null,
    takenAt: takenAt(write, input),
  };
}

/** Where the volts were read: as it was said; a charger's own display shows what the charger senses. */
function takenAt(write: ChargeWrite, input: ReadingInput): ChargeReading['takenAt'] {
  if (input.terminalVolts === null) return null;
  if (input.takenAt) return input.takenAt;
  if (input.meterId) return null;
  const channelId = presentStep(write)?.channelIds[0];
  const channel = write.file.charge.frozen.channels.find((one) => one.channelId === channelId);
  return channel === undefined ? null : channel.senses === 'module' ? 'module' : 'supply';
}

const presentStep = ({ file }: ChargeWrite) =>
  file.charge.option.steps[file.charge.reckoning?.reckoning.stepIndex ?? 0];

/** Volts at the supply lie between 0 and what the supply gives, and what so many groups can show. */
function terminalProblem(write: ChargeWrite, volts: number | null): string | null {
  if (volts === null) return null;
  const { charge, channels } = write.file;
  const step = presentStep(write);
  const names = listText(channelNamesOf(write.file, charge.reckoning?.reckoning.stepIndex ?? 0));
  const supply = Math.max(...(step?.channelIds ?? []).map((id) => channels.get(id)?.maxVolts ?? Infinity), 0);
  const groups = step?.way === 'terminals' ? charge.frozen.module.groupsInSeries : 1;
  const module = groups * (charge.frozen.module.chargeLimitVolts + UNDER_CURRENT_OVER_LIMIT_VOLTS);
  const slip = volts / 10 <= module && volts / 10 >= groups ? ' A point in the wrong place?' : '';
  if (volts < 0) return `${clipText(volts)} is reversed. Swap the meter's leads and read again.`;
  if (volts > module)
    return `${clipText(volts)} is more than ${groups === 1 ? 'one group shows' : `${groups} groups show`}.${slip || ' Read it again.'}`;
  if (supply > 0 && volts > supply * SUPPLY_SLACK)
    return `${clipText(volts)} is over the ${clipText(supply)} that ${names} gives.${slip || ' Read it again.'}`;
  return null;
}

/** Amps as the core counts them: into the module positive. A discharge may be typed without its sign. */
function signedAmps(write: ChargeWrite, amps: number | null, fields: Record<string, string>): number | null {
  if (amps === null) return null;
  const { charge } = write.file;
  const step = presentStep(write);
  const out = (step?.direction ?? charge.direction) === 'discharge';
  const planned = Math.abs(step?.setAmps ?? charge.option.amps);
  const size = Math.abs(amps);
  const wrongWay = ampsProblem(amps, out ? 'discharge' : 'charge');
  if (wrongWay !== null) {
    fields.amps = wrongWay;
    return null;
  }
  if (planned > 0 && size > planned * MOST_TIMES_PLANNED) {
    const slip = size / 10 <= planned * MOST_TIMES_PLANNED ? ' A point in the wrong place?' : ' Read it again.';
    fields.amps = `${ampsText(size)} is over twice the planned ${ampsText(planned)}.${slip}`;
    return null;
  }
  return out ? -size : size;
}

/** A group over its limit is what must be logged; only what cannot be is refused. */
function groupProblems({ file }: ChargeWrite, volts: number[] | null): Record<string, string> {
  if (volts === null) return {};
  const { module } = file.charge.frozen;
  const count = groupCountProblem(volts.length, module);
  if (count !== null) return { groupVolts: count };
  return Object.fromEntries(
    volts.flatMap((value, group) => {
      if (value <= module.chargeLimitVolts + UNDER_CURRENT_OVER_LIMIT_VOLTS) return [];
      const problem = groupVoltsProblem(value, module);
      return problem === null ? [] : [[`groupVolts.${group}`, problem]];
    }),
  );
}

/** '11.64 V, 10.0 A, 24 °C'. */
function readingText(reading: ReadingValues): string {
  const parts = [
    reading.terminalVolts === null ? null : clipText(reading.terminalVolts),
    reading.amps === null ? null : ampsText(Math.abs(reading.amps)),
    reading.celsius === null ? null : celsiusText(reading.celsius),
    reading.groupVolts === null ? null : `groups ${reading.groupVolts.map(cellText).join(', ')}`,
  ];
  return parts.filter((part) => part !== null).join(', ');
}

function tooWarm({ file }: ChargeWrite, { celsius }: ReadingValues): string {
  const { maxChargeCelsius: most } = file.charge.frozen.module;
  if (celsius === null || celsius <= most) return '';
  return ` Over this type's ${celsiusText(most)}: hold it and look.`;
}
