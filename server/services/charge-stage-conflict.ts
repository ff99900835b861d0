import type { Stage } from '@/shared/contract/charge';
import { conflict, type DomainError } from '../errors/domain-error';
import { chargeCard } from './charge-dto';
import { titleOf } from './charge-words';
import type { ChargeWrite } from './charge-write';

const words: Record<Stage, string> = {
  planned: 'is only planned',
  queued: 'is queued',
  charging: 'is charging',
  discharging: 'is discharging',
  tapering: 'is tapering',
  resting: 'is resting',
  'check-due': 'waits for its check',
  ready: 'is ready',
  fitted: 'is fitted',
  shelved: 'is back on the shelf',
  held: 'is held',
  stopped: 'was stopped',
};

/** 409: the act does not fit the stage; with the charge as it stands, and the sentence that says what does. */
export const wrongStage = ({ file, now }: ChargeWrite, so: string): DomainError =>
  conflict('wrong_stage', `${titleOf(file.charge)} ${words[file.charge.stage]}. ${so}`, chargeCard(file, now));
