import { createHash } from 'node:crypto';

/** Answers of this process by what was asked, at most so many; the one not asked for longest is forgotten first. */
export class Remembered<Answer> {
  readonly #answers = new Map<string, Answer>();

  constructor(readonly most: number) {}

  /** The answer to a question, computed only when it is not known. Of the question its hash is kept. */
  of(question: string, compute: () => Answer): Answer {
    const key = createHash('sha256').update(question).digest('base64');
    const known = this.#answers.get(key);
    const answer = known ?? compute();
    this.#answers.delete(key);
    this.#answers.set(key, answer);
    if (this.#answers.size > this.most) this.#answers.delete(this.#answers.keys().next().value!);
    return answer;
  }

  get size(): number {
    return this.#answers.size;
  }
}
