const bits = new DataView(new ArrayBuffer(8));

/** Position of a double in the order of all doubles. */
function ordinal(value: number): bigint {
  bits.setFloat64(0, value);
  const raw = bits.getBigInt64(0);
  return raw < 0n ? -(raw & 0x7fff_ffff_ffff_ffffn) : raw;
}

/** How many doubles lie between two numbers: 0 when equal, 1 for neighbours; Infinity when one alone is NaN. */
export function ulpsBetween(a: number, b: number): number {
  if (Number.isNaN(a) || Number.isNaN(b)) return Number.isNaN(a) && Number.isNaN(b) ? 0 : Infinity;
  const distance = ordinal(a) - ordinal(b);
  return Number(distance < 0n ? -distance : distance);
}
