// What an app of one's own imports.
export { Ebbwire, type EbbwireProps } from "./ebbwire.ts";
export { EbbwireStack } from "./ebbwireStack.ts";
