export declare const vsix: string;
export declare function packExtension(options?: {
  readonly builds?: boolean;
  readonly to?: string;
  readonly folder?: string;
}): Promise<string>;
