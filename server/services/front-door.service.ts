import packageJson from '@/package.json';
import type { FrontDoorDto } from '@/shared/contract/session';
import type { Deps } from '../deps';
import { demoWorkshopId } from '../demo/demo-workshop';
import { countWorkshops, findFirstWorkshop, findWorkshop } from '../repositories/workshops.repository';

/** What the sign-in page needs to know. A workshop is named only where there is no other to give away. */
export async function frontDoor(deps: Deps): Promise<FrontDoorDto> {
  const { manager } = deps.dataSource;
  const count = await countWorkshops(manager);
  const demo = deps.config.demo ? await findWorkshop(manager, demoWorkshopId) : null;
  const named = demo ?? (count === 1 ? await findFirstWorkshop(manager) : null);
  return { demo: demo !== null, empty: count === 0, workshopName: named?.name ?? null, version: packageJson.version };
}
