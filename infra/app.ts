import { App, Stack } from "aws-cdk-lib";
import { optionsFromContext } from "./context.ts";
import { Ebbwire } from "./ebbwire.ts";

const app = new App();
try {
  const options = optionsFromContext(app.node);
  const stack = new Stack(app, options.stackName, {
    description: "ebbwire: forecasts and notices for a store of time series",
  });
  new Ebbwire(stack, "Ebbwire", options);
  app.synth();
} catch (error) {
  // A wrong choice is the user's to mend: the sentence helps, the stack trace does not.
  if (!(error instanceof TypeError)) throw error;
  console.error(error.message);
  process.exitCode = 2;
}
