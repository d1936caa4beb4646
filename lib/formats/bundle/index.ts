export { type CitedRelease, citeAsBibtex, citeAsText } from './citation';
export { type BundleFile, packFiles, sortFiles } from './pack';
export { type CrateAuthor, type CrateFacts, type CrateRun, writeCrate } from './ro-crate';
export { bundleLimits, unpackFiles } from './unpack';
