/**
 * The one piece of the platform that reading needs: every place where the program runs (Node, a
 * window, a worker) has the Encoding Standard's decoder, but `analysis/` knows neither DOM nor Node.
 */
declare class TextDecoder {
  constructor(label?: string, options?: { readonly fatal?: boolean; readonly ignoreBOM?: boolean });
  decode(input?: Uint8Array): string;
}
