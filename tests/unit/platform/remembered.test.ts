import { describe, expect, it } from 'vitest';
import { Remembered } from '~/server/remembered';

describe('remembered answers', () => {
  it('are computed once for each question', () => {
    const remembered = new Remembered<number[]>(3);
    let computed = 0;
    const ask = (question: string) => remembered.of(question, () => [(computed += 1)]);
    const first = ask('one');
    expect(ask('two')).toEqual([2]);
    expect(ask('one')).toBe(first);
    expect(computed).toBe(2);
  });

  it('forget the one that was not asked for longest, and never keep more than they may', () => {
    const remembered = new Remembered<string>(2);
    const asked: string[] = [];
    const ask = (question: string) =>
      remembered.of(question, () => {
        asked.push(question);
        return question.toUpperCase();
      });
    for (const question of ['a', 'b', 'a', 'c', 'a', 'b']) ask(question);
    expect(asked).toEqual(['a', 'b', 'c', 'b']);
    expect(remembered.size).toBe(2);
  });

  it('are not kept where computing failed', () => {
    const remembered = new Remembered<number>(2);
    const fail = () => {
      throw new Error('no');
    };
    expect(() => remembered.of('a', fail)).toThrow('no');
    expect(remembered.of('a', () => 7)).toBe(7);
  });
});
