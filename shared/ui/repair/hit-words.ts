/** What a search says of what it found. Pure. */
import type { SearchHitDto } from '@/shared/contract/search';
import { stages } from '../stage/stages';

/** A charge that is over has no mark of its own. */
const stageWord = (stage: Extract<SearchHitDto, { kind: 'charge' }>['stage']): string =>
  stage === 'fitted' || stage === 'shelved' ? stage : stages[stage].word.toLowerCase();

export interface HitWords {
  /** 'Repair', 'Spare', 'Charge' */
  kind: string;
  title: string;
  text: string;
  path: string;
}

const stateWords = { open: 'open', 'handed-over': 'handed over', archived: 'in the archive', deleted: 'deleted' };
const whereWords = { shelf: 'on the shelf', charge: 'on a charge', quarantine: 'in quarantine', fitted: 'fitted' };
const joined = (parts: readonly (string | null)[]): string => parts.filter(Boolean).join(', ');

export function hitWords(hit: SearchHitDto): HitWords {
  switch (hit.kind) {
    case 'repair':
      return {
        kind: 'Repair',
        title: hit.number,
        text: joined([hit.vehicle, hit.bay, hit.customerName, stateWords[hit.state]]),
        path: `/repairs/${hit.id}`,
      };
    case 'spare':
      return {
        kind: 'Spare',
        title: hit.label,
        text: joined([hit.typeName, hit.shelfPlace, whereWords[hit.where]]),
        path: `/spares/${hit.id}`,
      };
    case 'charge':
      return {
        kind: 'Charge',
        title: hit.number,
        text: joined([hit.title === hit.number ? null : `for ${hit.title}`, hit.spareLabel, stageWord(hit.stage)]),
        path: `/charges/${hit.id}`,
      };
  }
}
