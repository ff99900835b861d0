/** All migrations in their order, listed: globs break in a bundle. */
import { Initial1764600000000 } from './1764600000000-initial';
import { NeighbourSpare1764700000000 } from './1764700000000-neighbour-spare';

export const migrations = [Initial1764600000000, NeighbourSpare1764700000000];
