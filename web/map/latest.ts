/** One question in flight at a time; of those asked meanwhile only the last is asked next. */

export class Latest<Question, Answer> {
  private waiting: Question | undefined;
  private busy = false;
  private generation = 0;
  private readonly answerTo: (question: Question) => Promise<Answer>;
  private readonly onAnswer: (question: Question, answer: Answer) => void;
  private readonly onFailure: (question: Question, error: unknown) => void;

  constructor(
    answerTo: (question: Question) => Promise<Answer>,
    onAnswer: (question: Question, answer: Answer) => void,
    onFailure: (question: Question, error: unknown) => void,
  ) {
    this.answerTo = answerTo;
    this.onAnswer = onAnswer;
    this.onFailure = onFailure;
  }

  /** Whether an answer is still to come. */
  get pending(): boolean {
    return this.busy;
  }

  ask(question: Question): void {
    if (this.busy) this.waiting = question;
    else void this.run(question);
  }

  /** Drops what is asked and what is still to be answered. */
  forget(): void {
    this.generation++;
    this.waiting = undefined;
  }

  private async run(question: Question): Promise<void> {
    this.busy = true;
    const generation = this.generation;
    let deliver: () => void;
    try {
      const answer = await this.answerTo(question);
      deliver = () => { this.onAnswer(question, answer); };
    } catch (error) {
      deliver = () => { this.onFailure(question, error); };
    }
    this.busy = false;
    const next = this.waiting;
    this.waiting = undefined;
    if (next !== undefined) void this.run(next);
    if (generation === this.generation) deliver();
  }
}
