/** Rows of numbers over time in bounded memory: when 2·`limit` rows are there, neighbours are averaged in pairs. */
export class PooledFrames {
  readonly rows: Float64Array[] = [];
  private weight = 1;
  private pending: Float64Array | null = null;
  private pendingCount = 0;

  constructor(private readonly limit: number) {}

  /** Frames of the input behind each row. */
  get framesPerRow(): number {
    return this.weight;
  }

  add(row: Float64Array): void {
    if (this.pending === null) this.pending = Float64Array.from(row);
    else
      for (let place = 0; place < row.length; place++)
        this.pending[place] = (this.pending[place] as number) + (row[place] as number);
    if (++this.pendingCount < this.weight) return;
    const { weight, pending } = this;
    this.rows.push(pending.map((value) => value / weight));
    this.pending = null;
    this.pendingCount = 0;
    if (this.rows.length === 2 * this.limit) this.merge();
  }

  private merge(): void {
    for (let place = 0; place < this.limit; place++) {
      const second = this.rows[2 * place + 1] as Float64Array;
      this.rows[place] = (this.rows[2 * place] as Float64Array).map(
        (value, column) => (value + (second[column] as number)) / 2,
      );
    }
    this.rows.length = this.limit;
    this.weight *= 2;
  }
}
