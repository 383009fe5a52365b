export declare function startApp(call: {
  readonly root: string;
  readonly args: readonly string[];
  readonly env: Readonly<Record<string, string | undefined>>;
  readonly say: (line: string) => void;
  readonly stop: AbortSignal;
}): Promise<number>;
