export type StartOptions =
  | {
      readonly ok: true;
      readonly isBrowserAsked: boolean;
      readonly opensBrowser: boolean;
      /** Null where none was asked for. */
      readonly port: number | null;
      readonly sheets: readonly string[];
    }
  | { readonly ok: false; readonly message: string };

export declare function startOptions(
  args: readonly string[],
  env: Readonly<Record<string, string | undefined>>,
): StartOptions;
