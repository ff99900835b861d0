import { QueryFailedError } from 'typeorm';
import { conflict } from '../errors/domain-error';

const sentences: [column: string, code: string, text: string][] = [
  ['channel_hold.channel_id', 'channel_taken', 'This channel was taken a moment ago. Look at the board and try again.'],
  ['charge.spare_id', 'spare_taken', 'This spare was put on another charge a moment ago. Take another spare.'],
  ['repair.spare_id', 'spare_reserved', 'This spare was reserved for another repair a moment ago. Take another spare.'],
  ['repair.workshop_id', 'name_taken', 'This number was given to another repair a moment ago. Try again.'],
  ['staffing.person_id', 'stale', 'Somebody else has given this person hours a moment ago. Look at them again.'],
  ['work.workshop_id', 'name_taken', 'This number was given to another piece of work a moment ago. Try again.'],
  ['work_stint.person_id', 'at_work', 'This person has begun other work a moment ago. Look at the plan again.'],
  ['run_stretch.charge_id', 'wrong_stage', 'This charge was begun a moment ago. Look at it again.'],
];

/**
 * The last word on what may exist once is the database's. Where its index refuses a row that the rules had let through
 * (another process was quicker), the answer is the same 409 as theirs.
 */
export async function refusingTaken<T>(work: Promise<T>): Promise<T> {
  try {
    return await work;
  } catch (error) {
    if (error instanceof QueryFailedError) {
      const found = sentences.find(([column]) => error.message.includes(`UNIQUE constraint failed: ${column}`));
      if (found) throw conflict(found[1], found[2]);
    }
    throw error;
  }
}
