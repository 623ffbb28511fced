/** `frequencyU95Hz` as a type becomes `frequency_u95_hz`. */
type Snake<Name extends string> = Name extends `${infer First}${infer Rest}`
  ? `${First extends Lowercase<First> ? First : `_${Lowercase<First>}`}${Snake<Rest>}`
  : Name;

/** `frequency_u95_hz` as a type becomes `frequencyU95Hz`. */
type Camel<Name extends string> = Name extends `${infer First}_${infer Rest}`
  ? `${First}${Capitalize<Camel<Rest>>}`
  : Name;

/** A value with the names of all fields in snake_case, to any depth. */
export type SnakeCased<Value> = Value extends readonly (infer Item)[]
  ? SnakeCased<Item>[]
  : Value extends object
    ? {
        [Name in keyof Value as Name extends string ? Snake<Name> : never]: SnakeCased<Value[Name]>;
      }
    : Value;

/** A value with the names of all fields in camelCase, to any depth. */
export type CamelCased<Value> = Value extends readonly (infer Item)[]
  ? CamelCased<Item>[]
  : Value extends object
    ? {
        [Name in keyof Value as Name extends string ? Camel<Name> : never]: CamelCased<Value[Name]>;
      }
    : Value;

/** Renames the fields of a core object to those of the wire; units keep their place. */
export function toSnakeCase<Value>(value: Value): SnakeCased<Value> {
  return renamed(value, snake) as SnakeCased<Value>;
}

/** Renames the fields of a validated body to those of the code. */
export function toCamelCase<Value>(value: Value): CamelCased<Value> {
  return renamed(value, camel) as CamelCased<Value>;
}

function snake(name: string): string {
  return name.replace(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`);
}

function camel(name: string): string {
  return name.replace(/_([a-z0-9])/g, (_, letter: string) => letter.toUpperCase());
}

function renamed(value: unknown, rename: (name: string) => string): unknown {
  if (Array.isArray(value)) return value.map((item) => renamed(item, rename));
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value).map(([name, inner]) => [rename(name), renamed(inner, rename)]),
  );
}
