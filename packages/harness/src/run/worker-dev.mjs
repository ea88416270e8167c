// In the workspace packages run from TypeScript source, which a worker thread must be taught to load.
import { register } from "tsx/esm/api";

register();
const { default: run, longRun } = await import("./worker.ts");

export { longRun };
export default run;
