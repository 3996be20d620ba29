/** The script of every worker. */
import { loadProgram } from './load.ts';

loadProgram().serveJobs();
