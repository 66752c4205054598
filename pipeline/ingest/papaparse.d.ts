/** What is used of papaparse. Its own declarations refer to Node's, which stages must not see. */
declare module 'papaparse/papaparse.js' {
  interface ParseError {
    readonly code: string;
    readonly message: string;
    readonly row?: number;
  }
  const papaparse: {
    parse(
      text: string,
      settings: {
        readonly delimiter?: string;
        readonly newline?: '\n' | '\r' | '\r\n';
        readonly skipEmptyLines?: boolean;
      },
    ): { readonly data: string[][]; readonly errors: readonly ParseError[] };
  };
  export default papaparse;
}
