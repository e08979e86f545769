/** Bytes of a file that came in, with the name the user knows it by. The host computes the hash. */
export interface InputFile {
  readonly name: string;
  readonly bytes: Uint8Array;
  /** Lower-case hex SHA-256 of `bytes`. */
  readonly sha256: string;
}
