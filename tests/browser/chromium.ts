/** The browser that the tests and the hardening rows drive, as Debian ships it. */
export const CHROMIUM = '/usr/bin/chromium';

/**
 * What the browser is told to leave out. The last such list is the one that counts, so it repeats
 * what Playwright leaves out itself.
 */
const leftOut = [
  // A page of the browser's own behind the address bar, loaded anew with each window: it takes a
  // second of a core from the page that is measured.
  ...['WebUIOmniboxPopup', 'WebUIOmniboxFullPopup', 'WebUIOmniboxAimPopup'],
  ...['AimEnabled', 'AvoidCorsURLLoaderRestartOnRedirect', 'AvoidUnnecessaryBeforeUnloadCheckSync'],
  ...['DestroyProfileOnBrowserClose', 'HttpsFirstBalancedModeAutoEnable', 'HttpsUpgrades'],
  ...['LensOverlay', 'MediaRouter', 'NetworkTimeServiceQuerying', 'OptimizationHints'],
  ...['PaintHolding', 'PreconnectToSearch', 'ThirdPartyStoragePartitioning'],
];

export const CHROMIUM_ARGUMENTS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  `--disable-features=${leftOut.join()}`,
];
