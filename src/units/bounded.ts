/** A number together with a bound that the true value of the stated model lies within: |true - value| <= error. */
export interface Bounded {
  readonly value: number;
  readonly error: number;
}
