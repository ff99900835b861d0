/** Entry of the worker thread that hashes: bcrypt in plain JavaScript blocks the thread it runs on. */
import { parentPort } from 'node:worker_threads';
import bcrypt from 'bcryptjs';
import type { BcryptAnswer, BcryptTask } from '../services/bcrypt-pool';

parentPort?.on('message', (task: BcryptTask) => {
  let answer: BcryptAnswer;
  try {
    answer = {
      id: task.id,
      result: 'hash' in task ? bcrypt.compareSync(task.password, task.hash) : bcrypt.hashSync(task.password, task.cost),
    };
  } catch (error) {
    answer = { id: task.id, error: error instanceof Error ? error.message : 'failed' };
  }
  parentPort?.postMessage(answer);
});
