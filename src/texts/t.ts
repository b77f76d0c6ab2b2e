import { en } from './en.ts';

/** The texts in use. Another language is another catalogue of the same shape. */
export const t = en;
