import { count, grouped } from './text.js';

/** One stage of work under way. */
export interface Stage {
  readonly name: string;
  /** What is counted: `substance`, `file`. */
  readonly unit: string;
  readonly total: number;
  readonly startedMs: number;
}

export interface Pace {
  readonly done: number;
  /** Per second, since the stage began; null before anything is done. */
  readonly rate: number | null;
  readonly secondsLeft: number | null;
}

/** How fast a stage goes and how long it will take, at its mean rate so far. */
export function pace({ total, startedMs }: Stage, done: number, nowMs: number): Pace {
  const seconds = (nowMs - startedMs) / 1000;
  if (done === 0 || seconds <= 0) return { done, rate: null, secondsLeft: done >= total ? 0 : null };
  const rate = done / seconds;
  return { done, rate, secondsLeft: Math.max(0, total - done) / rate };
}

/** `calculate  12,300 of 100,000 substances  4,200/s  21 s left`, cut to `width` columns. */
export function progressLine(stage: Stage, { done, rate, secondsLeft }: Pace, width: number): string {
  const parts = [
    stage.name,
    `${grouped(done)} of ${count(stage.total, stage.unit)}`,
    rate === null ? '' : `${grouped(rate)}/s`,
    secondsLeft === null ? '' : `${duration(Math.ceil(secondsLeft))} left`,
  ];
  return parts
    .filter((part) => part !== '')
    .join('  ')
    .slice(0, width);
}

/** `0.42 s`, `21 s`, `3 min 20 s`, `2 h 5 min`. */
export function duration(seconds: number): string {
  if (seconds < 10) return `${Number(seconds.toFixed(2))} s`;
  if (seconds < 100) return `${Math.round(seconds)} s`;
  if (seconds < 3600) return `${Math.floor(seconds / 60)} min ${Math.round(seconds % 60)} s`;
  return `${Math.floor(seconds / 3600)} h ${Math.round((seconds % 3600) / 60)} min`;
}
