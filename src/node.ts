/** What the library can do with files; needs Node. Everything else is in `postern` itself. */
export { type Content, checkFolder, OutputError, writeFileAtomic, writeFolder } from "./files/atomic.js";
export { type CsvValue, rowsToCsv, seriesToCsv } from "./files/csv.js";
export { potentialNames, potentialSource, readPotential } from "./files/potential-library.js";
export {
  type DesignFileOptions,
  type DesignSource,
  describeDesignFile,
  designFilePathValue,
  openDesignFile,
  readDesignFile,
} from "./files/read-design-file.js";
export { renderPng, renderSvg } from "./files/render-figure.js";
