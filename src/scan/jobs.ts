import { serve } from './serve.ts';

/** The whole of a worker. A job is a line here and a module of its own. */
export function serveJobs(): void {
  serve({
    'scan-point': async () => (await import('./point-job.ts')).pointJob,
    'breakdown-curve': async () => (await import('./curve-job.ts')).curveJob,
    'gap-yield': async () => (await import('./gap-job.ts')).gapJob,
    swarm: async () => (await import('./swarm-job.ts')).swarmJob,
    'window-request': async () => (await import('./window-job.ts')).windowJob,
  });
}
