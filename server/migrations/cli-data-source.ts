/**
 * For TypeORM's own command line, which drafts a migration from the difference between entities and database:
 * `node --import tsx node_modules/typeorm/cli.js migration:generate server/migrations/draft -d server/migrations/cli-data-source.ts --esm -p`
 */
import { makeDataSource } from '../data-source';

export const cliDataSource = makeDataSource(process.env.BIDEWELL_DATABASE ?? '/tmp/bidewell-draft.sqlite');
