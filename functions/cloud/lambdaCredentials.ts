/**
 * Stands in the bundles for `@aws-sdk/credential-provider-node`, which looks for credentials in a dozen places
 * (profiles, sign-on, metadata services): Lambda gives them in the environment.
 */
export { fromEnv as defaultProvider } from "@aws-sdk/credential-provider-env";
