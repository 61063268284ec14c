/** The few functions of jstat in use; the package brings no types of its own. */
declare module 'jstat' {
  const jstat: {
    readonly jStat: {
      /** log Γ(x), x > 0; absolute error below 1e-13 up to x = 8, growing from there on. */
      gammaln(x: number): number;
      readonly normal: {
        pdf(x: number, mean: number, sd: number): number;
        /** Eight digits or more in the middle, two in the far tail. */
        inv(p: number, mean: number, sd: number): number;
      };
    };
  };
  export default jstat;
}
