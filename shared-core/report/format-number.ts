export * from '../text/format-number.ts';
