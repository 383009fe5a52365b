import { expect, it } from 'vitest';
import { newSheet, setTitle } from '../../../analysis/index.ts';
import { begun, changed, redone, undone } from '../../../renderer/state/history.ts';

const sheets = ['one', 'two', 'three'].map((title) => setTitle(newSheet(), title));
const [one, two, three] = sheets as [(typeof sheets)[0], (typeof sheets)[0], (typeof sheets)[0]];

it('every change is undone and redone, by name', () => {
  const two_ = changed(changed(begun(one), 'first', two), 'second', three);
  expect(two_.past.at(-1)?.label).toBe('second');
  const back = undone(undone(two_));
  expect(back.present).toBe(one);
  expect(back.future.at(-1)?.label).toBe('first');
  expect(redone(redone(back)).present).toBe(three);
  expect(undone(back)).toEqual(back);
});

it('the changes of one gesture fold into one step, those of another do not', () => {
  const dragged = changed(changed(begun(one), 'move', two, 'g1'), 'move', three, 'g1');
  expect(undone(dragged).present).toBe(one);
  const again = changed(changed(begun(one), 'move', two, 'g1'), 'move', three, 'g2');
  expect(undone(again).present).toBe(two);
});

it('a new change forgets what was undone', () => {
  const back = undone(changed(begun(one), 'first', two));
  expect(changed(back, 'other', three).future).toEqual([]);
});

it('a change that changes nothing is no step', () => {
  const history = begun(one);
  expect(changed(history, 'nothing', one)).toBe(history);
});
