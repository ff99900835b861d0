/** Entry of the thread that plans the bench: a search over orders and channels would hold up everybody else. */
import type { BenchTask } from '../services/bench-plan/bench-tasks';
import { solveTask } from '../services/bench-plan/solve';
import { answerTasks } from '../services/worker-thread';

answerTasks((task: BenchTask) => solveTask(task));
