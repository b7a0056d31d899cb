export interface Workbench {
  readonly url: string;
  readonly userData: string;
  readonly extensions: string;
  stop(): void;
}
export interface LaunchOptions {
  /** The folder to open. */
  readonly folder: string;
  /** Packaged extensions to install. */
  readonly vsix: readonly string[];
  /** User settings. */
  readonly settings?: Record<string, unknown>;
  /** False: the question about trust is asked. */
  readonly trust?: boolean;
  readonly port?: number;
}
export declare function launchWorkbench(options: LaunchOptions): Promise<Workbench>;
export declare function writeSettings(userData: string, settings: Record<string, unknown>): void;
