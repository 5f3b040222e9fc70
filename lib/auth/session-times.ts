/** A browser session ends after this time unused … */
export const sessionIdleMs = 12 * 60 * 60 * 1000;
/** … and after this time in any case. */
export const sessionMaxSeconds = 7 * 24 * 60 * 60;
