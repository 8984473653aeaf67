/** A file as the read stage sees it: bytes and a name. Where the bytes came from is the caller's business. */
export interface InputFile {
  /** File name without its folder. */
  readonly name: string;
  readonly bytes: Uint8Array;
}
