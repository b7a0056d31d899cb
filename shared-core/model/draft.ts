import type { Motion } from "../mechanics/builder.ts";
import type { Span } from "../text/span.ts";
import type { GivenDetails } from "./details.ts";
import type { Findings } from "./findings.ts";
import type { FileContext, LetTable } from "./lets.ts";
import type { FileReader } from "./model.ts";
import type { Described } from "./names.ts";
import type { NumberContext } from "./number.ts";
import type {
  PlannedBind,
  PlannedCoordinate,
  PlannedDrive,
  PlannedLimit,
  PlannedNumber,
  PlannedStatement,
} from "./plan.ts";

/** A model while it is understood: what has been settled of its mechanics so far. */
export interface Draft {
  readonly main: FileContext;
  readonly findings: Findings;
  readonly lets: LetTable;
  readonly numbers: NumberContext;
  readonly reader: FileReader;
  /** Path of the model's file, to which other paths are relative. */
  readonly path: string;
  readonly statements: readonly Described[];
  /** Those that hold their name: of two with one name the first counts. */
  readonly counted: readonly Described[];
  readonly byName: ReadonlyMap<string, Described>;
  readonly coordinates: PlannedCoordinate[];
  readonly coordinateByName: Map<string, number>;
  readonly supports: { readonly name: string; readonly motion: Motion }[];
  readonly supportByName: Map<string, number>;
  readonly binds: PlannedBind[];
  readonly planned: PlannedStatement[];
  readonly plannedByName: Map<string, PlannedStatement>;
  /** Joining elements: their place in the assembly. */
  readonly elements: Map<string, number>;
  readonly drives: PlannedDrive[];
  readonly driveByName: Map<string, number>;
  readonly assumptions: Map<string, PlannedNumber>;
  readonly limits: Map<string, PlannedLimit>;
  /** Names whose statement has an error or is not computed: whatever names them stays quiet. */
  readonly unsound: Set<string>;
  /** Details of statements as they were read, once. */
  readonly given: Map<Described, GivenDetails>;
  /** Statements whose `like` is being followed. */
  readonly likeOpen: Described[];
  /** Other files that were read. */
  readonly files: Set<string>;
  /** Set by the first error in what moves, joins or drives. */
  buildable: boolean;
}

/** Takes a statement that puts itself into the equations. */
export function addPlanned(draft: Draft, planned: PlannedStatement): void {
  draft.planned.push(planned);
  draft.plannedByName.set(planned.name, planned);
}

/** Notes that a statement of the mechanics cannot be computed. */
export function spoil(draft: Draft, name: string | undefined): void {
  draft.buildable = false;
  if (name !== undefined) draft.unsound.add(name);
}

/** Says that a statement or detail is read and checked, and not computed. */
export function sayNotYet(draft: Draft, span: Span, what: string): void {
  draft.findings.say("not-yet-computed", span, `${what} is read, and this version does not compute it yet`, {
    hint: "the text is right; leave the line out to get answers without it",
  });
}
