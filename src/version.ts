/** The program's version, as in package.json (a test compares them). */
export const VERSION = '0.1.0';
