/**
 * The library: everything that computes, reads designs from text and draws, and nothing that needs Node, so that it runs
 * in a page as well. `postern/node` adds what reads files.
 *
 * ```js
 * import { estimate, readDesign } from "postern";
 * const { transmission, verdict } = await estimate(readDesign(text));
 * ```
 *
 * Lengths are in nm, energies in eV, times in fs, masses in eV fs^2/nm^2, unless a name says otherwise. Every probability
 * comes as `{ value, error }`, where `error` bounds the distance to the stated model's true value.
 */

export type { MapWindow } from "./analysis/density-recorder.js";
export { DensityRecorder } from "./analysis/density-recorder.js";
// Single calculations: a run made ready, the only time loop, and what looks on.
export type { Recorder } from "./analysis/recorder.js";
export type { DensityMap, Series, SeriesColumn } from "./analysis/results.js";
export { type Observed, SeriesRecorder } from "./analysis/series-recorder.js";
// Designs.
export { type DesignDescription, type DesignValue, describeDesign } from "./design/describe.js";
export { DesignError, type DesignFault } from "./design/design-error.js";
export { designErrorAt, type LateFault } from "./design/design-error-at.js";
export type { SourceText } from "./design/document.js";
export { designJsonSchema } from "./design/json-schema.js";
export type { LibraryEntry, LibraryReference } from "./design/library-format.js";
export type { ReadDesignOptions } from "./design/options.js";
export { type DesignPathValue, designPathValue } from "./design/path-value.js";
export { readDesign } from "./design/read-design.js";
export { readLibraryEntry } from "./design/use.js";
// Figures.
export { crosscheckFigure } from "./figures/crosscheck-figure.js";
export type { CrosscheckFigureOptions } from "./figures/drawn-crosscheck.js";
export { type Figure, figureToSvg, type Raster } from "./figures/figure.js";
export { type MapFigureOptions, mapFigure } from "./figures/map-figure.js";
export { type SpectrumFigureOptions, spectrumFigure } from "./figures/spectrum-figure.js";
export type { Grid } from "./grid/grid.js";
// Potentials.
export type { Potential } from "./potentials/potential.js";
export { shapeNamed, shapes } from "./potentials/registry.js";
export type {
  ListParameter,
  ParameterValues,
  QuantityParameter,
  ShapeDefinition,
  ShapeParameter,
} from "./potentials/shape.js";
export { ParameterError } from "./potentials/shape.js";
export { type SketchOptions, sketch } from "./potentials/sketch.js";
export { DEFAULT_ACCURACY, type Design, type Numerics, type PacketDesign } from "./problem/design.js";
export { type PropagateOptions, propagate, type Run } from "./propagate.js";
export { stepperNamed, steppers } from "./steppers/registry.js";
export type { Stepper, StepperDefinition, System, TimeOrder } from "./steppers/stepper.js";
// Studies: from a design to an answer.
export type { Calculation, Check, Progress, RunSummary, StudyOptions } from "./studies/calculation.js";
export { type Crosscheck, crosscheck } from "./studies/crosscheck.js";
export type { CrosscheckCheck } from "./studies/crosscheck-checks.js";
export { type Estimate, estimate } from "./studies/estimate.js";
export { type History, type HistoryOptions, history } from "./studies/history.js";
export { DesignLimitError } from "./studies/limits.js";
export type { MeasuredOrder } from "./studies/measured-order.js";
export type { Motion } from "./studies/motion.js";
export { type PreparedRun, type PrepareOptions, prepare } from "./studies/prepare.js";
export type { StateDistance, WitnessAnswer } from "./studies/second-opinions.js";
export { type Spectrum, type SpectrumOptions, spectrum } from "./studies/spectrum.js";
export { evenEnergies, packetEnergies } from "./studies/spectrum-energies.js";
export type { SpectrumMethod, SpectrumRow } from "./studies/spectrum-row.js";
export type { Bounded } from "./units/bounded.js";

// Quantities, and numbers with their bounds.
export { concise } from "./units/concise.js";
export {
  formatQuantity,
  parseQuantity,
  QuantityError,
  type QuantityKind,
  type QuantityNeed,
  type QuantityRange,
} from "./units/quantity.js";
