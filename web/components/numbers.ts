/** Numbers as pages print them; written beside the words so that sentences and charts share them. */
export * from '../words/numbers.ts';
