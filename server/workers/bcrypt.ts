/** Entry of the worker thread that hashes: bcrypt in plain JavaScript blocks the thread it runs on. */
import bcrypt from 'bcryptjs';
import type { BcryptTask } from '../services/bcrypt-pool';
import { answerTasks } from '../services/worker-thread';

answerTasks((task: BcryptTask) =>
  'hash' in task ? bcrypt.compareSync(task.password, task.hash) : bcrypt.hashSync(task.password, task.cost),
);
