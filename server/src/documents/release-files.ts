export type { DocumentInput } from './document-input';
export { makeDxf } from './dxf';
export { makeDrawing } from './part-drawing';
export { makeFullSizePrint } from './full-size-print';
