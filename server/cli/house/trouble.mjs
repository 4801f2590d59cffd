/** Something the person at the keyboard can put right: shown as one line and what to do, without a stack. */
export class Trouble extends Error {
  /**
   * @param what what went wrong, one sentence
   * @param remedy what to do about it, one sentence
   */
  constructor(what, remedy = '') {
    super(remedy ? `${what} ${remedy}` : what);
    this.name = 'Trouble';
  }
}

/** The text to show for any error: a Trouble in words, anything else (a defect of ours) with its stack. */
export function inWords(error) {
  return error instanceof Trouble ? error.message : (error?.stack ?? String(error));
}
