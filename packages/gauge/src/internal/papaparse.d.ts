/** The one call of the CSV library that is used. Its own type package brings Node's and the browser's globals along. */
declare module 'papaparse' {
  const Papa: {
    parse(
      text: string,
      options: { delimiter: string; newline: '\n'; skipEmptyLines: false },
    ): { data: string[][] };
  };
  export default Papa;
}
