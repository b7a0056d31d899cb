import type { Browser, LaunchOptions } from "playwright-core";

export declare function openBrowser(options?: LaunchOptions): Promise<Browser>;
