/** One change to the database, written as SQL. Each runs in a transaction of its own. */
export interface Migration {
  /** `YYYYMMDDHHMMSS-verb-object`, the same as the file name: the order in which changes are made. */
  name: string;
  up: string;
  down: string;
}
