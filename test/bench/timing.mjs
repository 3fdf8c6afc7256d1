export const median = (values) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)];
export const spread = (values) => (Math.max(...values) - Math.min(...values)) / median(values);

/** Seconds by the clock and by processor time of all threads that `work` takes. */
export function timed(work) {
  const cpu = process.cpuUsage();
  const start = process.hrtime.bigint();
  work();
  const wall_s = Number(process.hrtime.bigint() - start) / 1e9;
  const { user, system } = process.cpuUsage(cpu);
  return { wall_s, cpu_s: (user + system) / 1e6 };
}
