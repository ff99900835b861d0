import { calibrate, heldText, pooled, TWISTS, type Held } from '../calc/reference/calibration';

const SEEDS = [1, 2, 3, 4];

/** The 4,000 charges of the calibration, and 1,000 in each world that the code was not told of. Some minutes. */
export async function* benchCalibration(): AsyncGenerator<string> {
  yield 'the 80 % band against charges of the integrator with a random source of its own';
  const run = (twist: string, each: number): Held[] => pooled(SEEDS.map((seed) => calibrate(seed, each, twist)));
  const stated = run('as stated', 1000);
  yield* heldText('as stated', stated);
  for (const twist of Object.keys(TWISTS)) if (twist !== 'as stated') yield* heldText(twist, run(twist, 250), stated);
}
