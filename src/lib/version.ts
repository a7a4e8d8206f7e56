import manifest from '../../package.json';

/** Version of the software, stored with every result. */
export const VERSION: string = manifest.version;
