import type { Stage } from '@/shared/contract/charge';
import { conflict, DomainError } from '../errors/domain-error';
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

const CODE = 'wrong_stage';

/** 409: the act does not fit the stage; with the charge as it stands, and the sentence that says what does. */
export const wrongStage = ({ file, now }: ChargeWrite, so: string): DomainError =>
  conflict(CODE, `${titleOf(file.charge)} ${words[file.charge.stage]}. ${so}`, chargeCard(file, now));

export const isWrongStage = (error: unknown): error is DomainError =>
  error instanceof DomainError && error.code === CODE;
