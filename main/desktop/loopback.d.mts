export declare function serveLoopback(options: {
  readonly folder: string;
  readonly port?: number;
}): Promise<{ readonly address: string; readonly close: () => Promise<void> }>;
