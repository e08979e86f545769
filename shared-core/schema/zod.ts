import { config, z } from 'zod';

// By default the library compiles parsers with `new Function`, which the window's content policy forbids
// and reports as a violation. Without it every host also runs the very same code.
config({ jitless: true });

export { z };
