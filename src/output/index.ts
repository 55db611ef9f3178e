/** Drawing to bytes. Writers are thin: what a page holds is decided in `drawing`. */
export { type PdfMeta, writePdf } from './pdf'
export { pageToSvg } from './svg'
