/** All of the program in one script: see load.ts. */
export { start } from '../commands/cli.ts';
export { serveJobs } from '../scan/jobs.ts';
