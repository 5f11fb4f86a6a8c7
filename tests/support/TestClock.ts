/** The real time until told otherwise; `advance` moves it, so that no test has to wait. */
export class TestClock {
  private offsetMs = 0;

  readonly now = (): Date => new Date(Date.now() + this.offsetMs);

  advance({
    days = 0,
    hours = 0,
    minutes = 0,
    seconds = 0,
  }: Partial<Record<'days' | 'hours' | 'minutes' | 'seconds', number>>): void {
    this.offsetMs += (((days * 24 + hours) * 60 + minutes) * 60 + seconds) * 1000;
  }
}
