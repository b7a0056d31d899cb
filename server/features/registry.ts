import type { Serving } from "../serving.ts";
import { registerCodeActions } from "./code-actions.ts";
import { registerCodeLens } from "./code-lens.ts";
import { registerCompletion } from "./completion.ts";
import { registerFileMoves } from "./file-moves.ts";
import { registerFormatting } from "./formatting.ts";
import { registerHover } from "./hover.ts";
import { registerInlayHints } from "./inlay-hints.ts";
import { registerNavigation } from "./navigation.ts";
import { registerOwnRequests } from "./own-requests.ts";
import { registerRename } from "./rename.ts";
import { registerSemanticTokens } from "./semantic-tokens.ts";
import { registerSheet } from "./sheet.ts";
import { registerStructure } from "./structure.ts";
import { registerSymbols } from "./symbols.ts";

/** One file a feature; each only converts between the protocol and the core. */
export function registerFeatures(serving: Serving): void {
  for (const register of FEATURES) register(serving);
}

const FEATURES: readonly ((serving: Serving) => void)[] = [
  registerHover,
  registerInlayHints,
  registerCodeActions,
  registerCodeLens,
  registerCompletion,
  registerNavigation,
  registerRename,
  registerSymbols,
  registerStructure,
  registerSemanticTokens,
  registerFormatting,
  registerFileMoves,
  registerOwnRequests,
  registerSheet,
];
