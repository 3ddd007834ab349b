/** What is used of a package that brings no types. */
declare module 'ml-regression' {
  export const SimpleLinearRegression: new (
    x: readonly number[],
    y: readonly number[],
  ) => { readonly slope: number; readonly intercept: number };
}
