/** What the handlers use of the context that Lambda gives. */
export interface LambdaContext {
  readonly awsRequestId: string;
  getRemainingTimeInMillis(): number;
}
