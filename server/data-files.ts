import path from 'node:path';

/** Where the database lies within the data folder. */
export const databaseFile = (dataDir: string): string => path.join(dataDir, 'bidewell.sqlite');
