/** Entry of the worker thread that makes a copy: reading a large one through for its check would hold up the server. */
import fs from 'node:fs';
import path from 'node:path';
import { parentPort, workerData } from 'node:worker_threads';
import { backUp } from '../back-up';
import { backUpPhotos } from '../back-up-photos';
import type { BackUpOrder, BackUpDone } from '../services/backups';

const { source, photos, folder, now, kind } = workerData as BackUpOrder;
const file = await backUp(source, folder, new Date(now), kind ?? undefined);
const { there, copied, missing } = backUpPhotos(file, photos, path.join(folder, 'photos'));
const done: BackUpDone = { file, bytes: fs.statSync(file).size, photos: there, newPhotos: copied, missing };
parentPort?.postMessage(done);
