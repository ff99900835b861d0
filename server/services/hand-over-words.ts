/** The sentences of a hand-over sheet, out of the rows of its repair alone: no clock is asked. */
import { aimOf, groupsAt } from '@/shared/contract/pack';
import { advisedOutcomeNames, moduleFateNames, type RepairStepDto } from '@/shared/contract/repair';
import { repairStepNames } from '@/shared/contract/repair-steps';
import type { FittedSpare } from '../entities/fitted-spare';
import type { ModuleType } from '../entities/module-type';
import type { Spare } from '../entities/spare';
import type { NamedValue } from '../papers/hand-over-content';
import type { PaperWords } from '../papers/paper-words';
import { agreementOf } from './candidates.service';
import { bare, listText, lowerFirst } from './charge-words';
import { inMillivolts, packVerdict } from './pack-numbers';
import type { RepairFacts } from './repair-facts';
import type { RepairFile } from './repair-file';
import { usedCapacity } from './spare-capacity';

export const firstName = (file: RepairFile, personId: string): string =>
  (file.people.get(personId)?.name ?? 'somebody').split(' ')[0]!;

const sentence = (text: string): string => `${bare(text)}.`;
const groupName = (group: number): string => `G${group + 1}`;

/** 'G21 at 3.869 V, 87 mV below the median of 3.956 V' and what was off beside it; what the meter said; the rest. */
export function foundWords(file: RepairFile, facts: RepairFacts, words: PaperWords): string[] {
  const { arrival, verdict, failing, source } = facts;
  if (arrival === null || verdict === null) return ['The pack was not read.'];
  const volts = arrival.groupVolts;
  const off = (group: number) => inMillivolts(Math.abs((volts[group] ?? 0) - verdict.medianVolts));
  const told = (group: number) => {
    const way = (volts[group] ?? 0) < verdict.medianVolts ? 'below' : 'above';
    return `${groupName(group)} at ${words.volts(volts[group] ?? 0)}, ${words.millivolts(off(group))} ${way} the median`;
  };
  const inModule = failing === null ? [] : groupsAt(file.repair, failing);
  const oddHere = verdict.odd.filter((group) => inModule.includes(group)).sort((one, other) => off(other) - off(one));
  const others = verdict.odd.filter((group) => !inModule.includes(group));
  const out = new Set([...verdict.odd, ...inModule]);
  const rest = volts.filter((_, group) => !out.has(group));
  const found: string[] = [];
  if (failing !== null && oddHere.length > 0)
    found.push(`Module ${failing}: ${listText(oddHere.slice(0, 4).map(told))} of ${words.volts(verdict.medianVolts)}.`);
  else if (failing !== null) found.push(`Module ${failing} was found to fail.`);
  if (others.length > 0) {
    const more = others.length > 8 ? ` and ${others.length - 8} more` : '';
    found.push(`Out of line too: ${others.slice(0, 8).map(groupName).join(', ')}${more}.`);
  }
  if (source !== null) {
    found.push(`A hand meter at module ${source.modulePosition} read ${listText(source.groupVolts.map(words.volts))}.`);
    if (source.decidedAt !== null && source.decidedPosition !== null)
      found.push(
        `${firstName(file, source.decidedById ?? '')} decided for module ${source.decidedPosition}: ${sentence(source.decisionReason ?? '')}`,
      );
  }
  if (rest.length > 1) {
    const within = words.millivolts(inMillivolts(Math.max(...rest) - Math.min(...rest)));
    const which = out.size === 0 ? `All ${rest.length}` : `The other ${rest.length}`;
    found.push(`${which} groups lay within ${within}.`);
  }
  return found;
}

/** Which spare went where and what it was brought to; what became of what was taken out; what was left undone. */
export function changedWords(file: RepairFile, steps: readonly RepairStepDto[], words: PaperWords): NamedValue[] {
  const fitted = file.charges.filter(({ charge }) => charge.stage === 'fitted').reverse();
  const rows = fitted.flatMap(({ charge, spare, type, restChecks }): NamedValue[] => {
    const check = restChecks.at(-1);
    const target = `${words.volts(charge.frozen.target.volts)} ${words.tolerance(charge.toleranceVolts)}`;
    const groups = check ? check.verdict.groups.map(({ volts }) => volts) : [];
    const checked = groups.length === 0 ? '' : `, checked at ${groupsWords(groups, words)}`;
    return [
      spareWords(charge.modulePosition, spare, type, words),
      { name: 'brought to', value: `${target}${checked}` },
    ];
  });
  rows.push(...file.fittedAsItIs.toReversed().flatMap((one) => asItIsWords(file, one, words)));
  const taken = [...file.removed].reverse().map(({ modulePosition, fate, note }) => ({
    name: `Module ${modulePosition}, old`,
    value: `${lowerFirst(moduleFateNames[fate])}${note === null ? '' : `: ${bare(note)}`}`,
  }));
  const all = [...rows, ...taken];
  if (all.length === 0) all.push({ name: 'Modules', value: 'none changed' });
  const { repair } = file;
  const missing = steps.filter(({ state }) => state !== 'done').map(({ step }) => lowerFirst(repairStepNames[step]));
  if (repair.handedOverAt !== null && missing.length > 0)
    all.push({
      name: 'Not done',
      value: `${listText(missing)}${repair.handOverNote === null ? '' : `: ${bare(repair.handOverNote)}`}`,
    });
  return all;
}

/** What was advised, and what became of it: the customer's name where it was agreed to. */
export function advisedWords({ advised }: RepairFile, words: PaperWords): NamedValue[] {
  if (advised.length === 0) return [{ name: 'Advice', value: 'none' }];
  return advised.map(({ text, outcome, detail, agreedBy, agreedAt }) => {
    const agreed =
      agreedBy === null || agreedAt === null
        ? ''
        : `. Agreed: ${agreedBy}, ${words.date(agreedAt)} ${words.clock(agreedAt)}`;
    return {
      name: text,
      value: `${lowerFirst(advisedOutcomeNames[outcome])}${detail === null ? '' : `, ${bare(detail)}`}${agreed}`,
    };
  });
}

function spareWords(position: string | null, spare: Spare, type: ModuleType, words: PaperWords): NamedValue {
  const { capacityAh, source } = usedCapacity(spare, type);
  return {
    name: position === null ? 'Spare fitted' : `Module ${position}`,
    value: `spare ${spare.label}, ${words.ampHours(capacityAh)} ${source === 'label' ? 'by its label' : source}`,
  };
}

const groupsWords = (volts: readonly number[], words: PaperWords): string =>
  volts.length > 4
    ? `${words.voltsNumber(Math.min(...volts))} to ${words.volts(Math.max(...volts))}`
    : listText(volts.map(words.volts));

/** A spare that needed no charge: what it was held to, and what it was read at. */
function asItIsWords({ spares, type }: RepairFile, fitted: FittedSpare, words: PaperWords): NamedValue[] {
  const spare = spares.get(fitted.spareId);
  const target = `${words.volts(fitted.targetVolts)} ${words.tolerance(fitted.toleranceMillivolts / 1000)}`;
  return [
    ...(spare && type ? [spareWords(fitted.modulePosition, spare, type, words)] : []),
    { name: 'without a charge', value: `${target}, read at ${groupsWords(fitted.groupVolts, words)}` },
  ];
}

/** What the owner has to mind: what holds for every pack first, then what is so of this one. */
export function cautionWords(file: RepairFile, facts: RepairFacts, words: PaperWords): string[] {
  const found = [
    'Charge to full once in the next week, and let it stand for an hour afterwards.',
    'If the warning lamp comes on, or the pack smells or hisses, stop, get out, keep away and call the fire service, then us.',
  ];
  for (const { modulePosition, fate, note } of file.removed)
    if (fate === 'went-back-in')
      found.push(`Module ${modulePosition} went back in against our advice: ${sentence(note ?? '')}`);
  if (facts.proof === null) found.push('The pack was not read after the work: that it is in line is not proven.');
  else {
    const { spreadMillivolts } = packVerdict(facts.proof.groupVolts, file.repair);
    if (spreadMillivolts > aimOf(file.repair))
      found.push(
        `The last reading still spread over ${words.millivolts(spreadMillivolts)}; ${words.millivolts(aimOf(file.repair))} is the aim.`,
      );
  }
  const { fitted } = facts;
  const own = file.spares.get(facts.asItIs?.spareId ?? '');
  const inPack =
    fitted !== null
      ? { spare: fitted.spare, type: fitted.type, volts: fitted.charge.frozen.target.volts }
      : facts.asItIs !== null && own && file.type !== null
        ? { spare: own, type: file.type, volts: facts.asItIs.targetVolts }
        : null;
  if (inPack !== null) {
    const { capacityAh } = usedCapacity(inPack.spare, inPack.type);
    const agreement = agreementOf(inPack.type, capacityAh, inPack.volts);
    const low = Math.abs(agreement?.lowMillivolts ?? 0);
    // Under the aim it is as good as its neighbours.
    if (low >= aimOf(file.repair))
      found.push(
        `The spare holds another charge than its neighbours: at low charge the spread can rise to about ${words.millivolts(low)}.`,
      );
  }
  return found;
}
