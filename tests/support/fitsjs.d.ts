/** As much of the package as the tests use; it has no types of its own. */
declare module 'fitsjs' {
  interface Header {
    /** Value of a keyword as the library reads it. */
    get(keyword: string): string | number | boolean | null;
  }
  const fitsjs: { readonly astro: { readonly FITS: { readonly Header: new (block: string) => Header } } };
  export default fitsjs;
}
