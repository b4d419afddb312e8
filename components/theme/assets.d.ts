/** Metro hands a shipped font over as an asset. */
declare module '*.ttf' {
  const asset: number;
  export default asset;
}
