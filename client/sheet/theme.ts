/** Calls back when the editor exchanges its colours, or the system does. */
export function onThemeChange(changed: () => void): void {
  // The editor sets its kind on the body and its colours on the root element.
  const observer = new MutationObserver(changed);
  observer.observe(document.body, { attributes: true, attributeFilter: ["class", "data-vscode-theme-kind"] });
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ["style"] });
  matchMedia("(forced-colors: active)").addEventListener("change", changed);
}
