/** The script of every worker. A job is a line here and a module of its own. */
import { serve } from './serve.ts';

serve({
  'scan-point': async () => (await import('./point-job.ts')).pointJob,
  swarm: async () => (await import('./swarm-job.ts')).swarmJob,
  'window-request': async () => (await import('./window-job.ts')).windowJob,
});
