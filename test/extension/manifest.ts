import { read } from "../house/files.ts";

interface Setting {
  readonly type: string;
  readonly default: unknown;
  readonly scope?: string;
  readonly description: string;
  readonly enum?: readonly string[];
}

export interface Manifest {
  readonly main: string;
  readonly browser: string;
  readonly icon: string;
  readonly files: readonly string[];
  readonly dependencies: Record<string, string>;
  readonly activationEvents: readonly string[];
  readonly capabilities: Record<"untrustedWorkspaces" | "virtualWorkspaces", { readonly supported: unknown }>;
  readonly contributes: {
    readonly languages: readonly { readonly id: string; readonly configuration?: string }[];
    readonly configuration: { readonly properties: Record<string, Setting> };
    readonly commands: readonly {
      readonly command: string;
      readonly title: string;
      readonly category: string;
    }[];
    readonly menus: Record<string, readonly { readonly command: string; readonly when?: string }[]>;
    readonly keybindings?: readonly unknown[];
    readonly semanticTokenTypes: readonly { readonly id: string }[];
    readonly semanticTokenModifiers: readonly { readonly id: string }[];
    readonly semanticTokenScopes: readonly { readonly scopes: Record<string, readonly string[]> }[];
  };
}

export const manifest = JSON.parse(read("package.json")) as Manifest;
export const texts = JSON.parse(read("package.nls.json")) as Record<string, string>;
