const leastMs = 1000;

/**
 * How far a long run is, in at most one line a second and a last one with the totals; the same on
 * a terminal and in a log.
 */
export class EachProgress {
  fitted = 0;
  refused = 0;
  private readonly say: (line: string) => void;
  private readonly now: () => number;
  private readonly start: number;
  private said: number;

  /** @param now milliseconds of a clock that never runs back */
  constructor(say: (line: string) => void, now: () => number = () => performance.now()) {
    this.say = say;
    this.now = now;
    this.start = now();
    this.said = this.start;
  }

  add({ fitted, refused }: { readonly fitted: number; readonly refused: number }): void {
    this.fitted += fitted;
    this.refused += refused;
    const now = this.now();
    if (now - this.said < leastMs) return;
    this.said = now;
    this.say(`${this.counts()} so far, ${this.rate(now)}`);
  }

  finish(): void {
    const now = this.now();
    const seconds = ((now - this.start) / 1000).toFixed(1);
    this.say(`${this.counts()} in ${seconds} s, ${this.rate(now)}`);
  }

  private counts(): string {
    return `${this.fitted} fitted, ${this.refused} refused`;
  }

  private rate(now: number): string {
    const seconds = (now - this.start) / 1000;
    const rate = seconds > 0 ? (this.fitted + this.refused) / seconds : 0;
    return `${rate < 10 ? rate.toFixed(1) : Math.round(rate)} traces/s`;
  }
}
