import { name, version } from '@/package.json';

/** "Rarebound 0.1.0": what files name as their maker. */
export const SOFTWARE = `${name[0].toUpperCase()}${name.slice(1)} ${version}`;
export const SOFTWARE_VERSION = version;
