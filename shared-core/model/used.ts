import type { Diagnostic } from "../diagnostics/diagnostic.ts";
import { parse } from "../syntax/parser.ts";
import type { StatementNode, TextNode, Tree } from "../syntax/tree.ts";
import { LineIndex } from "../text/line-index.ts";
import type { Span } from "../text/span.ts";
import { readFile, resolvePath } from "./files.ts";
import { Findings } from "./findings.ts";
import type { FileContext } from "./lets.ts";
import type { Entity, FileReader } from "./model.ts";
import { collectNames, type Described, describeStatements, TAKEN_BY_USE } from "./names.ts";
import { PARSING } from "./parsing.ts";

/** A file that is used, directly or by a used one. */
export interface UsedFile {
  readonly path: string;
  readonly context: FileContext;
  readonly statements: readonly Described[];
  readonly syntax: readonly Diagnostic[];
}

/** A `use` statement of the model's own file with what it leads to. */
export interface DirectUse {
  readonly span: Span;
  readonly written: string;
  readonly used: UsedFile;
}

export interface Uses {
  readonly direct: readonly DirectUse[];
  /** All files, each once, the used before the using. */
  readonly all: readonly UsedFile[];
  /** Names of directly used files, as the model's own file sees them. */
  readonly names: ReadonlyMap<string, Entity>;
}

/** Reads the files that a model uses; each is read once, and a circle is said where it starts. */
export function readUses(
  path: string,
  tree: Tree,
  reader: FileReader,
  findings: Findings,
  contextOf: Map<Entity, FileContext>,
  files: Set<string>,
): Uses {
  const loading = new Loading(reader, contextOf, files);
  const direct: DirectUse[] = [];
  for (const node of usesIn(tree)) {
    const used = loading.load(path, node, [path], findings);
    const text = node.slots.path as TextNode;
    if (used !== undefined) direct.push({ span: text.span, written: text.text, used });
  }
  return { direct, all: [...loading.done.values()], names: namesOf(direct) };
}

const usesIn = (tree: Tree): StatementNode[] =>
  tree.statements.filter((node) => node.keyword.text === "use" && node.slots.path?.kind === "text");

/** What other files see of a file: its own lets, limits and kits. */
function namesOf(uses: readonly DirectUse[]): Map<string, Entity> {
  const names = new Map<string, Entity>();
  for (const { used } of uses) {
    for (const { name, node } of used.statements) {
      const entity = name === undefined ? undefined : used.context.names.get(name);
      if (entity?.node === node && TAKEN_BY_USE.has(entity.keyword) && !names.has(entity.name)) {
        names.set(entity.name, entity);
      }
    }
  }
  return names;
}

/** Files that use files that use files: deeper is no library that anybody laid out. */
const DEEPEST_USE = 50;

class Loading {
  readonly done = new Map<string, UsedFile>();

  constructor(
    readonly reader: FileReader,
    readonly contexts: Map<Entity, FileContext>,
    readonly files: Set<string>,
  ) {}

  load(from: string, node: StatementNode, open: readonly string[], findings: Findings): UsedFile | undefined {
    const text = node.slots.path as TextNode;
    const path = resolvePath(from, text.text);
    if (open.includes(path)) {
      const chain = [...open.slice(open.indexOf(path)), path].join(" -> ");
      findings.say("circular-definition", text.span, `\`${text.text}\` leads back to itself: ${chain}`, {
        hint: "move what both need into a third file",
      });
      return undefined;
    }
    const known = this.done.get(path);
    if (known !== undefined) return known;
    if (open.length > DEEPEST_USE) {
      findings.say(
        "circular-definition",
        text.span,
        `\`${text.text}\` lies more than ${DEEPEST_USE} files deep`,
        {
          hint: "use the file with the numbers directly",
        },
      );
      return undefined;
    }
    this.files.add(path);
    const content = readFile(path, text.text, text.span, this.reader, findings);
    if (content === undefined) return undefined;
    const used = this.#understand(path, content, [...open, path]);
    this.done.set(path, used);
    return used;
  }

  #understand(path: string, text: string, open: readonly string[]): UsedFile {
    const { tree, diagnostics } = parse(text, PARSING);
    const findings = new Findings();
    const direct: DirectUse[] = [];
    for (const node of usesIn(tree)) {
      const used = this.load(path, node, open, findings);
      const span = (node.slots.path as TextNode).span;
      if (used !== undefined) direct.push({ span, written: used.path, used });
    }
    const statements = describeStatements(tree);
    const names = collectNames(statements, namesOf(direct), tree, findings);
    for (const [name, entity] of names)
      if (entity.file === undefined) names.set(name, { ...entity, file: path });
    const context: FileContext = {
      file: path,
      tree,
      findings,
      names,
      contextOf: (entity) => this.contexts.get(entity) ?? context,
    };
    for (const entity of names.values()) if (entity.file === path) this.contexts.set(entity, context);
    return { path, context, statements, syntax: diagnostics };
  }
}

/**
 * Says the errors of a used file where it is used: the first one in words, with its place. Warnings and hints are
 * said when that file itself is looked at.
 */
export function sayErrorsOfUsed(uses: Uses, findings: Findings): void {
  for (const { span, written, used } of uses.direct) {
    const errors = [...used.syntax, ...used.context.findings.list].filter(
      (each) => each.severity === "error",
    );
    if (errors.length === 0) continue;
    const lines = new LineIndex(used.context.tree.text);
    const first = errors.reduce((a, b) => (b.span.start < a.span.start ? b : a));
    const line = lines.lineAt(first.span.start) + 1;
    const rest = errors.length > 1 ? ` (${errors.length - 1} more)` : "";
    findings.say(first.code, span, `\`${written}\`, line ${line}: ${first.message}${rest}`, {
      hint: first.hint,
      related: errors.map((each) => ({ file: used.path, span: each.span, message: each.message })),
    });
  }
}
