export declare const contentSecurityPolicy: string;
export declare const contentTypes: Readonly<Record<string, string>>;
export declare function headersFor(extension: string): Record<string, string>;
