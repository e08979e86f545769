import type { Role } from '../../state/inputs.ts';

export const roleNames: Readonly<Record<Role, string>> = {
  recording: 'recording',
  dark: 'dark',
  response: 'response',
  bench: 'bench file',
};
