import packageJson from '../../package.json';

/** Version of the program. */
export const { version } = packageJson;
