/**
 * Weights w_i with which measurements f(h_i), whose error is a series in h^2, h^4, ..., add up to the value at h = 0:
 *
 *   f(0) = sum_i w_i f(h_i),   w_i = product_(j != i) h_j^2 / (h_j^2 - h_i^2),
 *
 * the polynomial in h^2 through all of them, at zero. The same number as the tableau of `Extrapolation` gives, in the form that
 * whole states and series are added up with.
 * @param spacings relative spacings, all different and above zero
 * @throws RangeError when two of them are equal
 * Source: Lagrange's interpolation formula; L. F. Richardson, Phil. Trans. A 226, 299 (1927), citation from memory.
 */
export function extrapolationWeights(spacings: readonly number[]): number[] {
  if (new Set(spacings).size !== spacings.length)
    throw new RangeError(`extrapolation: different spacings are needed; got ${spacings.join(", ")}`);
  return spacings.map((h, i) =>
    spacings.reduce(
      (product, other, j) => (j === i ? product : (product * other ** 2) / (other ** 2 - h ** 2)),
      1,
    ),
  );
}

/** sum_i w_i a_i of arrays of equal length, in a new array. */
export function weightedSum(weights: readonly number[], arrays: readonly Float64Array[]): Float64Array {
  const sum = new Float64Array(arrays[0].length);
  arrays.forEach((array, i) => {
    const weight = weights[i];
    for (let j = 0; j < sum.length; j++) sum[j] += weight * array[j];
  });
  return sum;
}
