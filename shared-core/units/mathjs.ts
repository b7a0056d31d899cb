/** The part of mathjs that is used: named, so that a bundle holds no more of it. */
export { create, createUnitDependencies, unitDependencies } from "mathjs";
