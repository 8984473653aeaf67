/** Something on this machine keeps Evenglow from being set up; the message is a sentence for the person. */
export class SetUpError extends Error {
  /** @param {string} message */
  constructor(message) {
    super(message);
    this.name = 'SetUpError';
  }
}
