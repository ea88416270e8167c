// In the workspace packages run from TypeScript source, which a worker thread must be taught to load.
import { register } from "tsx/esm/api";

register();
const { default: run } = await import("./worker.ts");
export default run;
