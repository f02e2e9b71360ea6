import { App } from "aws-cdk-lib";
import { optionsFromContext } from "./context.ts";
import { EbbwireStack } from "./ebbwireStack.ts";
import { ChoiceError } from "./options.ts";

const app = new App();
try {
  const { stackName, ...choices } = optionsFromContext(app.node);
  new EbbwireStack(app, stackName, {
    description: "ebbwire: forecasts and notices for a store of time series",
    choices,
  });
  app.synth();
} catch (error) {
  // A wrong choice is the user's to mend: the sentence helps, the stack trace does not.
  if (!(error instanceof ChoiceError)) throw error;
  console.error(error.message);
  process.exitCode = 2;
}
