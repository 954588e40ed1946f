export * from './definition.ts';
export * from './definitions/index.ts';
export * from './expression.ts';
export * from './fields.ts';
