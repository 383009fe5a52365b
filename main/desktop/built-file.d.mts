export declare function builtFile(folder: string, urlPath: string): Promise<string | null>;
