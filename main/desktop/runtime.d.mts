export declare function electronRuntime(
  root: string,
  env?: Readonly<Record<string, string | undefined>>,
): string | null;
export declare function fetchRuntime(root: string, limitMs: number): Promise<boolean>;
