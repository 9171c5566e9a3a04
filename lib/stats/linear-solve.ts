/**
 * Inverse of a small symmetric positive matrix by Gauss-Jordan elimination with pivoting.
 * Null when it is singular to machine precision.
 */
export function invert(matrix: readonly (readonly number[])[]): number[][] | null {
  const n = matrix.length;
  const work = matrix.map((row, i) => [...row, ...row.map((_, j) => (i === j ? 1 : 0))]);
  for (let column = 0; column < n; column++) {
    let best = column;
    for (let row = column + 1; row < n; row++) {
      if (Math.abs(work[row]![column]!) > Math.abs(work[best]![column]!)) best = row;
    }
    const pivot = work[best]![column]!;
    if (!(Math.abs(pivot) > 1e-300)) return null;
    [work[column], work[best]] = [work[best]!, work[column]!];
    const lead = work[column]!.map((value) => value / pivot);
    work[column] = lead;
    for (let row = 0; row < n; row++) {
      if (row === column) continue;
      const factor = work[row]![column]!;
      work[row] = work[row]!.map((value, j) => value - factor * lead[j]!);
    }
  }
  return work.map((row) => row.slice(n));
}
