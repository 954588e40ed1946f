import { expect, test } from 'vitest';
import { splitProse } from './split-prose.ts';

test('paragraphs, inline and display formulas', () => {
  expect(splitProse('One $E_n$ here.\n\n$$E = mc$$\nEnd.')).toEqual([
    [
      { kind: 'text', text: 'One ' },
      { kind: 'inline', text: 'E_n' },
      { kind: 'text', text: ' here.' },
    ],
    [
      { kind: 'display', text: 'E = mc' },
      { kind: 'text', text: '\nEnd.' },
    ],
  ]);
});

test('a lone dollar sign is text', () => {
  expect(splitProse('costs 5 $ today')).toEqual([[{ kind: 'text', text: 'costs 5 $ today' }]]);
});

test('emphasis', () => {
  expect(splitProse('**Two layers** at U')).toEqual([
    [
      { kind: 'strong', text: 'Two layers' },
      { kind: 'text', text: ' at U' },
    ],
  ]);
});
