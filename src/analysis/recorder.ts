/** Looks at the state at t = 0, after every `every`-th step and after the last one. Must not change the state. */
export interface Recorder {
  readonly every: number;
  record(time: number, psi: Float64Array): void;
}
