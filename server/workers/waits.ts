/** Entry of the thread that reckons over the history of waits: a replay of two years would hold up everybody else. */
import { solveWaits } from '../services/waits/solve-waits';
import type { WaitsTask } from '../services/waits/waits-tasks';
import { answerTasks } from '../services/worker-thread';

answerTasks((task: WaitsTask) => solveWaits(task));
