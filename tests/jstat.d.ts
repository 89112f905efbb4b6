/** The part of jstat the numeric tests compare with; the package brings no types of its own. */
declare module 'jstat' {
  interface JStat {
    gammaln(x: number): number;
    normal: {
      cdf(x: number, mean: number, sd: number): number;
      inv(p: number, mean: number, sd: number): number;
    };
    beta: { cdf(x: number, a: number, b: number): number; inv(p: number, a: number, b: number): number };
    binomial: { cdf(y: number, n: number, p: number): number };
  }
  const jstat: JStat;
  export default jstat;
}
