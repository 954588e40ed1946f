import type { ReactNode } from 'react';

/** Every state is a word and a shape, never colour alone. */
const box = { x: 1.5, y: 1.5, width: 8, height: 8 };
const line = { fill: 'none', stroke: 'currentColor', strokeWidth: 1.4 };
const shapes = {
  wedge: <path d="M1.5 1 10 5.5 1.5 10Z" fill="currentColor" />,
  diamond: <path d="M5.5 1 10 5.5 5.5 10 1 5.5Z" {...line} />,
  crescent: <path d="M7.6 1.2A4.6 4.6 0 1 0 7.6 9.8 5.4 5.4 0 0 1 7.6 1.2Z" {...line} strokeLinejoin="round" />,
  square: <rect {...box} fill="currentColor" />,
  hollow: <rect {...box} {...line} />,
  cross: <path d="M1.5 1.5 9.5 9.5M9.5 1.5 1.5 9.5" {...line} strokeWidth={1.7} />,
  tick: (
    <g {...line}>
      <rect {...box} />
      <path d="M3.4 5.6 5 7.3 8 3.6" />
    </g>
  ),
  dash: <path d="M1 5.5H10" {...line} strokeWidth={1.7} />,
  bars: <path d="M3.2 1.5V9.5M7.8 1.5V9.5" {...line} strokeWidth={2} />,
  slash: (
    <g {...line}>
      <rect {...box} />
      <path d="M1.5 9.5 9.5 1.5" />
    </g>
  ),
  split: <path d="M1 3.6H10M1 7.4H10M8 1 3 10" {...line} />,
  ring: <circle cx="5.5" cy="5.5" r="4" {...line} />,
  dot: <circle cx="5.5" cy="5.5" r="1.6" fill="currentColor" />,
};
export type Shape = keyof typeof shapes;

const shapeOf: Record<string, Shape> = {
  running: 'wedge',
  active: 'wedge',
  waiting: 'diamond',
  held: 'diamond',
  parked: 'diamond',
  tonight: 'crescent',
  finished: 'square',
  'finished, some failed': 'cross',
  done: 'square',
  reused: 'hollow',
  failed: 'cross',
  'check failed': 'cross',
  'broken off': 'cross',
  paused: 'bars',
  cancelled: 'slash',
  'left out': 'slash',
  deactivated: 'slash',
  retired: 'slash',
  stopped: 'slash',
  disputed: 'split',
  holds: 'tick',
  identical: 'tick',
  differs: 'dash',
  different: 'dash',
  first: 'square',
  current: 'square',
  released: 'hollow',
  silent: 'ring',
  'winding down': 'crescent',
};

export function Mark({ shape, className = '' }: { shape: Shape; className?: string }) {
  return (
    <svg aria-hidden="true" viewBox="0 0 11 11" className={`inline-block size-[11px] shrink-0 ${className}`}>
      {shapes[shape]}
    </svg>
  );
}

/** `broken-off` reads 'broken off' on screens. */
export const stateWord = (state: string): string => state.replaceAll('-', ' ');

export function StateMark({ state, children }: { state: string; children?: ReactNode }) {
  const word = stateWord(state);
  return (
    <span
      className={`inline-flex items-center gap-2 whitespace-nowrap ${word === 'running' ? 'font-semibold text-ambert' : ''}`}
    >
      <Mark shape={shapeOf[word] ?? 'dot'} className={word === 'running' ? 'text-amberm' : ''} />
      {children ?? word}
    </span>
  );
}
