/** Reads a secret's text. The client is loaded at the first use: most cold starts never need it. */
export async function readSecret(secretId: string): Promise<string | undefined> {
  const { GetSecretValueCommand, SecretsManagerClient } = await import("@aws-sdk/client-secrets-manager");
  const client = new SecretsManagerClient({ maxAttempts: 5 });
  try {
    return (await client.send(new GetSecretValueCommand({ SecretId: secretId }))).SecretString;
  } finally {
    client.destroy();
  }
}
