declare module 'jstat' {
  /** The part the tests use: distributions by name. */
  interface JstatDistribution {
    cdf(x: number, ...params: number[]): number;
    inv(p: number, ...params: number[]): number;
    pdf(x: number, ...params: number[]): number;
  }
  const jstat: Readonly<Record<string, JstatDistribution>>;
  export default jstat;
}
