type Fields = Readonly<Record<string, string | number | boolean | null | undefined | readonly string[]>>;

/** A line of JSON a happening. Messages are constant sentences; what varies stands in fields beside them. */
export interface Log {
  info(message: string, fields?: Fields): void;
  warn(message: string, fields?: Fields): void;
  error(message: string, fields?: Fields): void;
  /** A document that is written as it stands: metrics. */
  document(document: object): void;
}

export type WriteLine = (line: string) => void;

/**
 * Writes to standard output itself, past Lambda's console, which would put metrics into a text field where
 * CloudWatch does not look for them. `timestamp` and `level` are the names Lambda's own level filter reads.
 */
export const writeStandardOutput: WriteLine = (line) => {
  process.stdout.write(`${line}\n`);
};

/**
 * A log whose every line carries `common`: the run and the request. Callers give names of tables and webhooks,
 * codes and counts; never bodies, addresses or values from tables.
 */
export function jsonLog(write: WriteLine, clock: () => number, common: Fields): Log {
  const line =
    (level: string) =>
    (message: string, fields: Fields = {}) =>
      write(
        JSON.stringify({ timestamp: new Date(clock()).toISOString(), level, message, ...common, ...fields }),
      );
  return {
    info: line("INFO"),
    warn: line("WARN"),
    error: line("ERROR"),
    document: (document) => write(JSON.stringify({ ...document, ...common })),
  };
}
