/** The English of the engine and of the headless command, in one place. */
export * from './advice.ts';
export * from './command.ts';
export * from './headline.ts';
export * from './reasons.ts';
export * from './refusals.ts';
