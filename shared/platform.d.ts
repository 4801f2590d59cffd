/** The few things of the platform that `shared/` may use; they exist alike in Node and in browsers. Seen by `shared/tsconfig.json` only. */
declare class TextDecoder {
  constructor(label?: string, options?: { fatal?: boolean; ignoreBOM?: boolean });
  readonly encoding: string;
  decode(input?: Uint8Array, options?: { stream?: boolean }): string;
}
