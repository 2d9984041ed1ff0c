/// <reference types="expo/types" />

/** jstat ships no types; these are the functions that the project uses. */
declare module 'jstat' {
  type Distribution = {
    pdf(x: number, ...parameters: number[]): number;
    cdf(x: number, ...parameters: number[]): number;
    inv(p: number, ...parameters: number[]): number;
  };
  export const jStat: {
    normal: Distribution;
    studentt: Distribution;
    binomial: { pdf(k: number, n: number, p: number): number };
  };
}
