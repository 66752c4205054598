/** What the process says to the scheduler that started it. */
export const EXIT = {
  /** A release was published, or the command did what it was asked. */
  done: 0,
  /** Nothing could be published; the old release stands. Also: a release that fails `verify`. */
  nothing: 1,
  /** The command was used wrongly. */
  usage: 2,
  /** With `--strict`: something is withheld. */
  withheld: 3,
  /** The loss guard held the new release back. */
  heldBack: 4,
} as const;

export type ExitStatus = (typeof EXIT)[keyof typeof EXIT];

/** An error that a person can act on: what happened, and what to do next. It ends the command with `status`. */
export class Stop extends Error {
  readonly next: string;
  readonly status: ExitStatus;

  constructor(message: string, next: string, status: ExitStatus = EXIT.nothing) {
    super(message);
    this.name = 'Stop';
    this.next = next;
    this.status = status;
  }
}
