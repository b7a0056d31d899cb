/** What finds files by a pattern, named so that a bundle can load it when there is a pattern. */
export { glob, isDynamicPattern } from "tinyglobby";
