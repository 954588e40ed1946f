export type Planner = Record<never, never>;
