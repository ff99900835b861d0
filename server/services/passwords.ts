/** Hashes passwords in worker threads: bcrypt at cost 12 takes a third of a second, in which nobody may wait. */
export interface Passwords {
  hash(password: string): Promise<string>;
  /** Takes as long for an unknown person (`null`) as for a wrong password, and says no. */
  matches(password: string, hash: string | null): Promise<boolean>;
  close(): Promise<void>;
}
