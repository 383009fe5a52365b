export declare function isStale(root: string): boolean;
export declare function build(root: string, logLevel?: 'warn' | 'error'): Promise<string | null>;
