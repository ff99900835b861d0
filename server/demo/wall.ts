/** The wall of the demo: a screen over the bench that was paired some days ago and was on a moment ago. */
import type { Deps } from '../deps';
import { approveWall, askForCode, collectWallToken } from '../services/wall-pairing.service';
import { wallOf } from '../services/who-asks';
import { memberOf } from './people';

const SECOND = 1000;
const DAY = 86_400_000;
/** What the browser of a small computer behind a screen calls itself. */
const userAgent =
  'Mozilla/5.0 (X11; Linux aarch64) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/139.0.0.0 Safari/537.36';

/** Pairs it as a screen and a foreman do: the screen asks and shows a code, she types it, it collects its right. */
export async function pairWall(deps: Deps, now: number): Promise<void> {
  const asked = now - 9 * DAY;
  const code = await askForCode(deps, { userAgent, baseUrl: 'http://localhost' }, asked);
  const form = { userCode: code.userCode, name: 'Bench wall', diagonalInches: 55, distanceMetres: 7 };
  await approveWall(deps, memberOf('hella'), form, asked + 50 * SECOND);
  const { token } = await collectWallToken(deps, code.deviceCode, asked + 53 * SECOND);
  await wallOf(deps, token, now - 20 * SECOND);
}
