import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import ts from 'typescript';

/** A JSON Schema (draft 7) of one SDK type. */
export type JsonSchema = Record<string, unknown>;

export interface SchemaFile {
  roots: Record<string, JsonSchema>;
  definitions: Record<string, JsonSchema>;
}

const REPOSITORY = join(__dirname, '../../../..');
const CACHE_DIR = join(REPOSITORY, '.tmp/sdk-schemas');

/** Turns types of the installed SDK into closed schemas: what a type does not name is not allowed. */
class SchemaWriter {
  readonly definitions: Record<string, JsonSchema> = {};
  private readonly names = new Map<ts.Type, string>();

  constructor(private readonly checker: ts.TypeChecker) {}

  write(type: ts.Type): JsonSchema {
    const { flags } = type;
    if (flags & ts.TypeFlags.Any) throw new Error('a type could not be resolved');
    if (flags & ts.TypeFlags.Null) return { type: 'null' };
    if (type.isStringLiteral() || type.isNumberLiteral()) return { const: type.value };
    if (flags & ts.TypeFlags.BooleanLiteral) return { const: this.checker.typeToString(type) === 'true' };
    if (flags & ts.TypeFlags.StringLike) return { type: 'string' };
    if (flags & ts.TypeFlags.NumberLike) return { type: 'number' };
    if (flags & ts.TypeFlags.BooleanLike) return { type: 'boolean' };
    if (type.isUnion()) return this.writeUnion(type);
    // OtherString is `string & Record<never, never>`: any text.
    if (type.isIntersection()) return { type: 'string' };
    if (this.checker.isArrayType(type)) {
      const [item] = this.checker.getTypeArguments(type as ts.TypeReference);
      return { type: 'array', items: this.write(item!) };
    }
    return this.reference(type);
  }

  private writeUnion(type: ts.UnionType): JsonSchema {
    const isAbsent = (part: ts.Type): boolean =>
      (part.flags & (ts.TypeFlags.Undefined | ts.TypeFlags.Void)) !== 0;
    const options = type.types.filter((part) => !isAbsent(part)).map((part) => this.write(part));
    if (options.length === 1) return options[0]!;
    return { anyOf: options };
  }

  private reference(type: ts.Type): JsonSchema {
    const symbol = type.aliasSymbol ?? type.getSymbol();
    // The SDK makes Decimal objects out of decimal text.
    if (symbol?.name === 'Decimal') return { type: 'string' };
    let name = this.names.get(type);
    if (name === undefined) {
      name = `${symbol?.name ?? 'object'}.${this.names.size}`;
      this.names.set(type, name);
      this.definitions[name] = this.writeObject(type);
    }
    return { $ref: `#/definitions/${name}` };
  }

  private writeObject(type: ts.Type): JsonSchema {
    const properties: Record<string, JsonSchema> = {};
    const required: string[] = [];
    for (const property of this.checker.getPropertiesOfType(type)) {
      const propertyType = this.checker.getTypeOfSymbol(property);
      // `deleted?: void` marks what only a deleted object has.
      if (this.isVoidOnly(propertyType)) continue;
      properties[property.name] = this.write(propertyType);
      if (!(property.flags & ts.SymbolFlags.Optional)) required.push(property.name);
    }
    const index = this.checker.getIndexTypeOfType(type, ts.IndexKind.String);
    return { type: 'object', properties, required, additionalProperties: index ? this.write(index) : false };
  }

  private isVoidOnly(type: ts.Type): boolean {
    const parts = type.isUnion() ? type.types : [type];
    return parts.every((part) => (part.flags & (ts.TypeFlags.Undefined | ts.TypeFlags.Void)) !== 0);
  }
}

function compile(roots: Record<string, string>, fileName: string): SchemaFile {
  const members = Object.entries(roots).map(([name, type]) => `${JSON.stringify(name)}: ${type};`);
  const source = `import type { Stripe } from 'stripe';\nexport interface Roots { ${members.join('\n')} }`;
  const options: ts.CompilerOptions = {
    target: ts.ScriptTarget.ES2022,
    module: ts.ModuleKind.NodeNext,
    moduleResolution: ts.ModuleResolutionKind.NodeNext,
    strict: true,
    noEmit: true,
    skipLibCheck: true,
    types: ['node'],
    typeRoots: [join(REPOSITORY, 'node_modules/@types')],
  };
  writeFileSync(fileName, source);
  const program = ts.createProgram([fileName], options);
  const file = program.getSourceFile(fileName)!;
  const problems = program.getSemanticDiagnostics(file);
  if (problems.length > 0) throw new Error(ts.flattenDiagnosticMessageText(problems[0]!.messageText, '\n'));
  const checker = program.getTypeChecker();
  const rootInterface = file.statements.find(ts.isInterfaceDeclaration)!;
  const writer = new SchemaWriter(checker);
  const written = rootInterface.members.map((member) => {
    const name = (member.name as ts.StringLiteral).text;
    return [name, writer.write(checker.getTypeAtLocation(member))];
  });
  return { roots: Object.fromEntries(written), definitions: writer.definitions };
}

/**
 * Schemas of SDK types by a name of the caller's choice, for example `{ charge: 'Stripe.Charge' }`. The first call
 * for a set of types asks the compiler (about ten seconds); later ones read the ignored cache folder.
 */
export function sdkSchemas(roots: Record<string, string>): SchemaFile {
  const sdk = readFileSync(join(dirname(require.resolve('stripe')), '../package.json'), 'utf8');
  const key = createHash('sha256').update(sdk).update(readFileSync(__filename)).update(JSON.stringify(roots));
  const cached = join(CACHE_DIR, `${key.digest('hex').slice(0, 16)}.json`);
  if (existsSync(cached)) return JSON.parse(readFileSync(cached, 'utf8')) as SchemaFile;
  mkdirSync(CACHE_DIR, { recursive: true });
  // A file of its own on disk: the compiler takes it for an ES module because of the package around it.
  const schemas = compile(roots, cached.replace('.json', `-${process.pid}.ts`));
  writeFileSync(`${cached}.${process.pid}`, JSON.stringify(schemas));
  renameSync(`${cached}.${process.pid}`, cached);
  return schemas;
}
