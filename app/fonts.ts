import light from '@fontsource/source-sans-3/files/source-sans-3-latin-300-normal.woff2';
import regular from '@fontsource/source-sans-3/files/source-sans-3-latin-400-normal.woff2';
import semibold from '@fontsource/source-sans-3/files/source-sans-3-latin-600-normal.woff2';

/** Asked for with the page itself: a typeface that comes later moves what stands there already. */
export const firstFonts: string[] = [regular, light, semibold];
