/** Colour variables as the editor's own four default themes set them on a webview; from memory of their defaults. */
export type ThemeKind =
  | "vscode-light"
  | "vscode-dark"
  | "vscode-high-contrast"
  | "vscode-high-contrast-light";

export const THEME_KINDS: readonly ThemeKind[] = [
  "vscode-light",
  "vscode-dark",
  "vscode-high-contrast",
  "vscode-high-contrast-light",
];

const FONTS = {
  "font-family": "system-ui, 'DejaVu Sans', sans-serif",
  "editor-font-family": "'DejaVu Sans Mono', monospace",
};

export const THEMES: Readonly<Record<ThemeKind, Readonly<Record<string, string>>>> = {
  "vscode-light": {
    ...FONTS,
    "editor-foreground": "#3b3b3b",
    "editor-background": "#ffffff",
    descriptionForeground: "#3b3b3b",
    "textLink-foreground": "#005fb8",
    errorForeground: "#f85149",
    "list-errorForeground": "#b01011",
    "list-warningForeground": "#855f00",
    "editorWarning-foreground": "#895503",
    focusBorder: "#005fb8",
    "charts-orange": "#b5622a",
    "charts-green": "#388a34",
    "charts-purple": "#652d90",
  },
  "vscode-dark": {
    ...FONTS,
    "editor-foreground": "#cccccc",
    "editor-background": "#1f1f1f",
    descriptionForeground: "#9d9d9d",
    "textLink-foreground": "#4daafc",
    errorForeground: "#f85149",
    "list-errorForeground": "#f88070",
    "list-warningForeground": "#cca700",
    "editorWarning-foreground": "#cca700",
    focusBorder: "#0078d4",
    "charts-orange": "#d18616",
    "charts-green": "#89d185",
    "charts-purple": "#b180d7",
  },
  "vscode-high-contrast": {
    ...FONTS,
    "editor-foreground": "#ffffff",
    "editor-background": "#000000",
    descriptionForeground: "#ffffffb3",
    "textLink-foreground": "#21a6ff",
    errorForeground: "#f48771",
    "editorWarning-foreground": "#ffd370",
    focusBorder: "#f38518",
    contrastBorder: "#6fc3df",
    "charts-orange": "#d18616",
    "charts-green": "#89d185",
    "charts-purple": "#b180d7",
  },
  "vscode-high-contrast-light": {
    ...FONTS,
    "editor-foreground": "#292929",
    "editor-background": "#ffffff",
    descriptionForeground: "#292929b3",
    "textLink-foreground": "#0f4a85",
    errorForeground: "#b5200d",
    "editorWarning-foreground": "#895503",
    focusBorder: "#006bbd",
    contrastBorder: "#0f4a85",
    "charts-orange": "#b5622a",
    "charts-green": "#374e06",
    "charts-purple": "#652d90",
  },
};
