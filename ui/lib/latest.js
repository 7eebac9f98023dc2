// Work that is asked for more often than it can be done: one at a time, and only the newest counts.

/**
 * @template Asked, Answer
 */
export class Latest {
  #busy = false;
  /** @type {{ asked: Asked } | null} */
  #waiting = null;
  #work;
  #done;
  #failed;

  /**
   * @param {(asked: Asked) => Promise<Answer>} work
   * @param {(answer: Answer) => void} done called with the answer to the newest, not with one that was overtaken
   * @param {(error: unknown) => void} failed
   */
  constructor(work, done, failed) {
    this.#work = work;
    this.#done = done;
    this.#failed = failed;
  }

  /**
   * Asks. What was asked before and has not begun is forgotten.
   * @param {Asked} asked
   */
  ask(asked) {
    this.#waiting = { asked };
    if (!this.#busy) this.#run();
  }

  /** Forgets everything: no answer comes any more. */
  stop() {
    this.#waiting = null;
    this.#done = () => {};
    this.#failed = () => {};
  }

  async #run() {
    this.#busy = true;
    while (this.#waiting) {
      const { asked } = this.#waiting;
      this.#waiting = null;
      try {
        const answer = await this.#work(asked);
        if (!this.#waiting) this.#done(answer);
      } catch (error) {
        if (!this.#waiting) this.#failed(error);
      }
    }
    this.#busy = false;
  }
}
