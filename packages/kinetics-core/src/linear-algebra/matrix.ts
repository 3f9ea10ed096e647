/** A dense matrix, column after column in one Float64Array: element (i, j) is `values[j * rows + i]`. */
export interface Matrix {
  readonly rows: number;
  readonly columns: number;
  readonly values: Float64Array;
}

export function zeroMatrix(rows: number, columns: number): Matrix {
  return { rows, columns, values: new Float64Array(rows * columns) };
}

/** From columns of equal length; `rows` is needed where there may be no column at all. */
export function matrixFromColumns(
  columns: readonly ArrayLike<number>[],
  rows = columns[0]?.length ?? 0,
): Matrix {
  const matrix = zeroMatrix(rows, columns.length);
  columns.forEach((column, j) => {
    if (column.length !== rows)
      throw new RangeError(`column ${j} has ${column.length} elements, the first has ${rows}`);
    matrix.values.set(Array.from(column), j * rows);
  });
  return matrix;
}

export function entry(matrix: Matrix, row: number, column: number): number {
  const value = matrix.values[column * matrix.rows + row];
  if (value === undefined || row >= matrix.rows)
    throw new RangeError(`no element (${row}, ${column}) in a ${matrix.rows} by ${matrix.columns} matrix`);
  return value;
}

/** A view, not a copy. */
export function columnOf(matrix: Matrix, column: number): Float64Array {
  return matrix.values.subarray(column * matrix.rows, (column + 1) * matrix.rows);
}

/** Σ aᵢ bᵢ of two vectors of one length. */
export function dot(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += (a[i] ?? 0) * (b[i] ?? 0);
  return sum;
}

/** Matrix times vector. */
export function times(matrix: Matrix, vector: ArrayLike<number>): Float64Array {
  const result = new Float64Array(matrix.rows);
  for (let j = 0; j < matrix.columns; j++) {
    const factor = vector[j] ?? 0;
    const column = columnOf(matrix, j);
    for (let i = 0; i < matrix.rows; i++) result[i] = (result[i] ?? 0) + factor * (column[i] ?? 0);
  }
  return result;
}
