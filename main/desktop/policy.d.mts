export declare const contentSecurityPolicy: string;
export declare function headersFor(extension: string): Record<string, string>;
