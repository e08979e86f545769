/** 0: done, whatever the verdict. 1: some input could not be used. 2: wrong usage. */
export type ExitStatus = 0 | 1 | 2;
