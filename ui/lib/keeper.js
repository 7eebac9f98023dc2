// Keeps what is typed on the disk: after a moment of quiet, or at once when the form is about to be left.

/** Milliseconds of quiet before a draft is kept. */
export const quietMs = 300;

/** @typedef {{ setTimeout: (work: () => void, ms: number) => any, clearTimeout: (timer: any) => void }} Clock */

/**
 * One save at a time, and always the newest; the first save gives the draft its identity, so that a second one must
 * wait for it.
 * @template Value
 */
export class Keeper {
  #save;
  #clock;
  /** @type {any} */
  #timer = null;
  /** @type {{ value: Value } | null} */
  #unsaved = null;
  /** @type {Promise<void>} */
  #saving = Promise.resolve();
  #stopped = false;

  /**
   * @param {(value: Value) => Promise<void>} save
   * @param {Clock} [clock]
   */
  constructor(
    save,
    clock = { setTimeout: (work, ms) => setTimeout(work, ms), clearTimeout: (timer) => clearTimeout(timer) },
  ) {
    this.#save = save;
    this.#clock = clock;
  }

  /**
   * Something has been typed.
   * @param {Value} value
   */
  touch(value) {
    if (this.#stopped) return;
    this.#unsaved = { value };
    this.#clock.clearTimeout(this.#timer);
    this.#timer = this.#clock.setTimeout(() => this.flush(), quietMs);
  }

  /** Saves now what is not saved yet. Comes back when everything is on the disk. */
  flush() {
    this.#clock.clearTimeout(this.#timer);
    this.#saving = this.#saving.then(async () => {
      const unsaved = this.#unsaved;
      if (!unsaved) return;
      this.#unsaved = null;
      await this.#save(unsaved.value);
    });
    return this.#saving;
  }

  /** Saves nothing any more. Comes back when a save that had begun has ended. */
  stop() {
    this.#stopped = true;
    this.#clock.clearTimeout(this.#timer);
    this.#unsaved = null;
    return this.#saving;
  }
}
