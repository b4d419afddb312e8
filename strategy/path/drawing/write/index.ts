export type { CutFile, CutFileUnit, CutLayer } from './cut-file.ts';
export { cutFileUnits, cutLayers } from './cut-file.ts';
export type { BlockFrame } from './blocks.ts';
export { blocksText } from './blocks.ts';
export { dxfText } from './dxf.ts';
export { svgText } from './svg-picture.ts';
