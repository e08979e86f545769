import { parseArgs, type ParseArgsConfig } from 'node:util';

/** The command was called in a way it does not know: exit status 2, one line saying what to change. */
export class UsageFault extends Error {}

type Options = NonNullable<ParseArgsConfig['options']>;

/** `parseArgs`, strict, with its complaints turned into usage faults. */
export function readWords<const O extends Options>(words: readonly string[], options: O) {
  try {
    return parseArgs({ args: [...words], options, allowPositionals: true, strict: true });
  } catch (error) {
    if (error instanceof TypeError && 'code' in error) {
      throw new UsageFault(complaintOf(Object.assign(error, { code: error.code })));
    }
    throw error;
  }
}

/** A number an option asks for; the value is taken as people write it, "1e20" as well as "12000". */
export function numberOption(
  name: string,
  text: string | undefined,
  rule: { readonly min: number; readonly max: number; readonly isWhole?: boolean; readonly unit: string },
): number {
  const value = text === undefined || text.trim() === '' ? Number.NaN : Number(text);
  const isFit = value >= rule.min && value <= rule.max && (rule.isWhole !== true || Number.isInteger(value));
  if (isFit) return value;
  const kind = rule.isWhole === true ? 'a whole number' : 'a number';
  const unit = rule.unit === '' ? '' : ` ${rule.unit}`;
  const found = text === undefined ? 'nothing' : `"${text}"`;
  throw new UsageFault(
    `--${name} wants ${kind} from ${plain(rule.min)} to ${plain(rule.max)}${unit}, found ${found}.`,
  );
}

/** "500" and "1e25", as people would type them. */
const plain = (value: number): string =>
  value < 1e7 ? String(value) : value.toExponential().replace('e+', 'e');

function complaintOf(error: TypeError & { code: unknown }): string {
  const option = /'(--?[\w-]+)/.exec(error.message)?.[1];
  if (error.code === 'ERR_PARSE_ARGS_INVALID_OPTION_VALUE' && option !== undefined) {
    return error.message.includes('does not take')
      ? `${option} takes no value.`
      : `${option} wants a value that does not begin with a dash.`;
  }
  return option === undefined ? firstSentence(error.message) : `there is no option ${option} here.`;
}

function firstSentence(message: string): string {
  const sentence = message.split(/\. |\n/)[0] ?? message;
  return `${sentence.replace(/\.$/, '')}.`;
}
