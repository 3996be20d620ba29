/** Period and amplitude of the gap voltage where it repeats at the end of a run: the last three swings alike.
 *
 *  @param extremes maxima (+1) and minima (−1) of the voltage in order of time
 *  @param largest the run's largest |V_open| [V]; swings below 1 % of it do not count
 *  @param end of the run [s]; the last extreme must lie within one and a half periods of it */
export function oscillationOf(
  extremes: readonly { readonly time: number; readonly voltage: number; readonly kind: 1 | -1 }[],
  largest: number,
  end: number,
): { period_s: number; amplitude_V: number } | null {
  const maxima = extremes.filter((e) => e.kind > 0);
  const minima = extremes.filter((e) => e.kind < 0);
  if (maxima.length < 4 || minima.length < 4) return null;
  const last = maxima.slice(-4);
  const low = minima.slice(-4);
  const periods = [1, 2, 3].map((k) => last[k].time - last[k - 1].time);
  const swings = [0, 1, 2, 3].map((k) => last[k].voltage - low[k].voltage);
  const period = (periods[0] + periods[1] + periods[2]) / 3;
  const swing = (swings[0] + swings[1] + swings[2] + swings[3]) / 4;
  if (!(swing > 0.01 * largest)) return null;
  if (periods.some((p) => Math.abs(p - period) > 0.02 * period)) return null;
  if (swings.some((s) => Math.abs(s - swing) > 0.02 * swing)) return null;
  if (end - last[3].time > 1.5 * period) return null;
  return { period_s: period, amplitude_V: swing / 2 };
}
