import { typeset } from '../../shared-core/text/typeset.ts';
import { Quantity } from './quantity.tsx';

/** A sentence of the diagnosis, set as a page should: powers of ten raised. */
export function Prose({ text }: { readonly text: string }) {
  return <Quantity text={typeset(text)} />;
}
