export declare function electronRuntime(
  root: string,
  env?: Readonly<Record<string, string | undefined>>,
): string | null;
export declare function fetchRuntime(
  root: string,
  until: { readonly limitMs: number; readonly stop?: AbortSignal },
): Promise<void>;
