import type { Progress } from '../matrix/progress.ts';

/** Turns work done (entries and lines looked at) into progress calls, one every quarter million, whatever the shape of the matrix. */
export class Ticker {
  private done = 0;
  private sinceCall = 0;
  private phase = 'reading structure';
  private readonly total: number;
  private readonly progress: Progress;

  /** `total`: expected work of the whole survey; the fraction stops just short of 1 when it was too low a guess. */
  constructor(progress: Progress, total: number) {
    this.progress = progress;
    this.total = Math.max(1, total);
  }

  /** Names what comes next, and reports. */
  begin(phase: string): void {
    this.phase = phase;
    this.report();
  }

  /** Adds work; called once a column, so it must stay cheap. */
  add(work: number): void {
    this.sinceCall += work + 1;
    if (this.sinceCall > 250_000) this.report();
  }

  /** The same phase for a kernel of another room; its fraction is not ours, so only the call is passed on. */
  readonly pass: Progress = () => this.report();

  private report(): void {
    this.done += this.sinceCall;
    this.sinceCall = 0;
    this.progress(Math.min(0.999, this.done / this.total), this.phase);
  }
}
