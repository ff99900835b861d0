/** What lists and pages say of a repair. Pure; instants are epoch ms. */
import type { PackReadingDto, SecondSourceDto } from '@/shared/contract/pack-reading';
import type { RepairBlock, RepairCardDto, RepairDto, RepairStepDto } from '@/shared/contract/repair';
import { repairStepNames, repairSteps } from '@/shared/contract/repair-steps';
import { channelsOf, firstName, markOf, stageWords } from '../charge/card-model';
import { coming } from '../bench/bench-words';
import { millivolts } from '../format/quantities';
import { stages, type StageMark } from '../stage/stages';

/** Readings that count, newest first. */
export const standing = (readings: readonly PackReadingDto[]): PackReadingDto[] =>
  readings.filter(({ setAside }) => setAside === null).sort((a, b) => b.at.localeCompare(a.at));

/** 'Grey van, bay 3' */
export const vehicleAndBay = ({ vehicle, bay }: Pick<RepairCardDto, 'vehicle' | 'bay'>): string =>
  [vehicle, bay].filter(Boolean).join(', ');

/** '96 groups in 48 modules of 2'; modules of several sizes have no 'of'. */
export function packWords({ groupCount, moduleCount, groupsPerModule }: RepairDto['pack']): string {
  const modules = `${moduleCount} ${moduleCount === 1 ? 'module' : 'modules'}`;
  const each = moduleCount * groupsPerModule === groupCount ? ` of ${groupsPerModule}` : '';
  return `${groupCount} ${groupCount === 1 ? 'group' : 'groups'} in ${modules}${each}`;
}

const blockWords: Record<RepairBlock['code'], string> = {
  'sources-disagree': 'Must decide',
  'module-condition': 'Look at a module',
  'module-unknown': 'No module found',
  'check-outside': 'Outside',
  'charge-odd': 'Odd readings',
};

/** The sign of a repair: what blocks it, or the stage of its charge. Null: neither. */
export function signOf(card: Pick<RepairCardDto, 'block' | 'charge'>): { mark: StageMark; word: string } | null {
  if (card.charge?.overdueSince) return { mark: 'overdue', word: stages.overdue.word };
  if (card.block)
    return { mark: card.block.code === 'charge-odd' ? 'overdue' : 'check-due', word: blockWords[card.block.code] };
  return card.charge ? { mark: markOf(card.charge), word: stages[markOf(card.charge)].word } : null;
}

/** What it waits for, in a line. @param at writes an instant */
export function waitsFor(card: RepairCardDto, at: (instant: string) => string, now: number): string {
  if (card.block) return card.block.text;
  const { charge } = card;
  if (charge) {
    if (charge.stage === 'ready') return card.failing ? `Module ${card.failing} to be fitted` : 'To be fitted';
    const where = channelsOf(charge);
    return [where ? `on ${where}` : stageWords(charge).toLowerCase(), coming(charge, at, now)]
      .filter(Boolean)
      .join(', ');
  }
  const spread = card.spreadMillivolts === null ? '' : `spread ${millivolts(card.spreadMillivolts / 1000)}`;
  switch (card.step) {
    case 'read':
      return 'The pack is to be read';
    case 'second-source':
      return 'A second source at the module';
    case 'target':
      return 'Its target is to be taken';
    case 'spare':
      return card.failing ? `A spare for module ${card.failing}` : 'A spare';
    case 'charge':
      return 'Its charge is to be planned';
    case 'fit':
      return 'Its module is to be fitted';
    case 'prove':
      return ['The proof', spread].filter(Boolean).join(', ');
    case null:
      return spread ? `Handed over, ${spread}` : 'Handed over';
  }
}

/** Where a repair stands among the seven, from 1; all done: 7. */
export const stepNumber = (step: RepairCardDto['step']): number =>
  step === null ? repairSteps.length : repairSteps.indexOf(step) + 1;

/** The steps of a card, which does not carry them: before the present one done, after it to come. */
export function stepsOfCard(card: Pick<RepairCardDto, 'step' | 'block'>): Pick<RepairStepDto, 'step' | 'state'>[] {
  const present = card.step === null ? repairSteps.length : repairSteps.indexOf(card.step);
  return repairSteps.map((step, index) => ({
    step,
    state: index < present ? 'done' : index > present ? 'to-come' : card.block ? 'blocked' : 'present',
  }));
}

/** The step that is on, or the one that is blocked; null: all are done. */
export const presentStep = <S extends Pick<RepairStepDto, 'state'>>(steps: readonly S[]): S | null =>
  steps.find(({ state }) => state === 'present' || state === 'blocked') ?? null;

/** 'then fit, prove' */
export function thenWords(steps: readonly Pick<RepairStepDto, 'step' | 'state'>[]): string {
  const next = steps.filter(({ state }) => state === 'to-come').map(({ step }) => repairStepNames[step].toLowerCase());
  return next.length === 0 ? '' : `then ${next.slice(0, 2).join(', ')}`;
}

/** 'Hand meter at module 17, Ines' */
export function sourceWords(source: SecondSourceDto): { title: string; agrees: boolean } {
  const meter = source.pointsTo ?? source.modulePosition;
  const { decided } = source;
  if (source.agrees) return { title: `Second source agrees: module ${meter}`, agrees: true };
  if (!decided) return { title: `Second source disagrees: it says module ${meter}`, agrees: false };
  const by = firstName(decided.by.name);
  return decided.decision === 'module'
    ? { title: `${by} decided: module ${decided.modulePosition ?? ''}`, agrees: true }
    : { title: `${by} decided: the pack is read again`, agrees: false };
}

/** Position of the module that came out, where a spare is in and nobody has recorded what became of it; null: nothing is missing. */
export function unrecorded({
  steps,
  failing,
  removed,
}: Pick<RepairDto, 'steps' | 'failing' | 'removed'>): string | null {
  const fitted = steps.some(({ step, state }) => step === 'fit' && state === 'done');
  return fitted && failing !== null && !removed.some(({ modulePosition }) => modulePosition === failing)
    ? failing
    : null;
}
