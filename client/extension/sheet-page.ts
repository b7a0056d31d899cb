import * as vscode from "vscode";

/** The page around the sheet's program: nothing but the two files of the package may be loaded or run. */
export function sheetPage(webview: vscode.Webview, files: vscode.Uri): string {
  const nonce = crypto.randomUUID();
  const address = (name: string) => webview.asWebviewUri(vscode.Uri.joinPath(files, name)).toString();
  const policy = [
    "default-src 'none'",
    `script-src 'nonce-${nonce}'`,
    `style-src ${webview.cspSource}`,
    // A picture is drawn from text of the page before it is saved as pixels.
    "img-src data:",
  ].join("; ");
  return `<!DOCTYPE html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${policy}">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>Response sheet</title>
<link rel="stylesheet" href="${address("sheet.css")}">
</head>
<body><script nonce="${nonce}" src="${address("sheet.js")}"></script></body>
</html>`;
}
