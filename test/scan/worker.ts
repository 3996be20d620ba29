/** The program's own worker, for tests that run from the sources. */
import { serveJobs } from '../../src/scan/jobs.ts';

serveJobs();
