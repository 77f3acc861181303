import { commit, redo, startHistory, undo } from '@/components/bench/history';

describe('history', () => {
  it('undoes and redoes step by step', () => {
    let history = startHistory(0);
    history = commit(history, 1, 'a', true);
    history = commit(history, 2, 'b', true);
    history = undo(history);
    expect(history.present).toBe(1);
    history = undo(history);
    expect([history.present, history.past.length]).toEqual([0, 0]);
    history = redo(redo(history));
    expect(history.present).toBe(2);
  });

  it('takes a whole drag as one step', () => {
    let history = startHistory(0);
    for (const value of [1, 2, 3]) history = commit(history, value, 'arw', false);
    history = commit(history, 4, 'arw', true);
    expect(undo(history).present).toBe(0);
    history = commit(history, 5, 'arw', true);
    expect(undo(history).present).toBe(4);
  });

  it('does not mix drags of two things', () => {
    let history = startHistory(0);
    history = commit(history, 1, 'arw', false);
    history = commit(history, 10, 'windows', false);
    history = commit(history, 11, 'windows', true);
    expect(undo(history).present).toBe(1);
  });

  it('a new change forgets what was undone', () => {
    let history = commit(startHistory(0), 1, 'a', true);
    history = commit(undo(history), 7, 'a', true);
    expect(redo(history)).toBe(history);
    expect(history.present).toBe(7);
  });

  it('has nothing to undo at the start, and does not grow for ever', () => {
    const fresh = startHistory(0);
    expect(undo(fresh)).toBe(fresh);
    let history = startHistory(0);
    for (let i = 1; i <= 1000; i++) history = commit(history, i, String(i), true);
    expect(history.past.length).toBe(200);
  });
});
