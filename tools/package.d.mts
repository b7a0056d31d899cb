export declare const vsix: string;
export declare function packExtension(options?: {
  readonly builds?: boolean;
  readonly to?: string;
  /** Without the entry for Node. */
  readonly host?: "web";
}): Promise<string>;
