/**
 * Solves a small system of linear equations by elimination with partial pivoting.
 *
 * @param matrix - rows of coefficients, each with its right side as last element; overwritten
 * @returns the unknowns, or null when the equations don't determine them
 */
export function solveLinear(matrix: number[][]): number[] | null {
  const size = matrix.length;
  for (let column = 0; column < size; column++) {
    let pivot = column;
    for (let row = column + 1; row < size; row++) {
      if (Math.abs(matrix[row][column]) > Math.abs(matrix[pivot][column])) pivot = row;
    }
    if (!(Math.abs(matrix[pivot][column]) > 0)) return null;
    [matrix[column], matrix[pivot]] = [matrix[pivot], matrix[column]];
    for (let row = column + 1; row < size; row++) {
      const factor = matrix[row][column] / matrix[column][column];
      for (let k = column; k <= size; k++) matrix[row][k] -= factor * matrix[column][k];
    }
  }
  const solution = new Array<number>(size).fill(0);
  for (let row = size - 1; row >= 0; row--) {
    let value = matrix[row][size];
    for (let k = row + 1; k < size; k++) value -= matrix[row][k] * solution[k];
    solution[row] = value / matrix[row][row];
  }
  return solution;
}
