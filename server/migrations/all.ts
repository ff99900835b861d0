/** All migrations in their order, listed: globs break in a bundle. */
import { Initial1764600000000 } from './1764600000000-initial';

export const migrations = [Initial1764600000000];
