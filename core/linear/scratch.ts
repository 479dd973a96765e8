/** Vectors lent out for the length of one call, so that solving a system many times allocates nothing. */

function lender(): (size: number) => Float64Array {
  let vector = new Float64Array(0);
  return (size) => {
    if (vector.length !== size) vector = new Float64Array(size);
    return vector;
  };
}

/** Each name belongs to one function alone; contents are whatever the last call left. */
export const scratch = {
  /** `residual`: |A| |x| + |b|. */
  magnitude: lender(),
  /** `refine`: residual, then correction. */
  remainder: lender(),
  /** `refine`: the best solution so far. */
  best: lender(),
  /** `refine`: a right-hand side that shares its array with x. */
  rightHandSide: lender(),
};
