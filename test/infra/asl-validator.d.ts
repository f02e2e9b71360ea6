// The package carries no types.
declare module "asl-validator" {
  export default function validate(definition: unknown): { isValid: boolean; errorsText(): string };
}
