/** Sleeps until the next due instant kept in the database. `poke` after every commit that may have moved it. */
export interface Sleeper {
  poke(): void;
}
