// Writes types.d.ts, the types of every request and reply, from docs/desk.schema.json.
//   node tools/types.mjs           writes the file
//   node tools/types.mjs --print   prints it
import { readFileSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

const schemaFile = new URL('../../docs/desk.schema.json', import.meta.url);
const typesFile = new URL('../types.d.ts', import.meta.url);

/**
 * The text of types.d.ts.
 * @param {any} schema a JSON Schema whose `$defs` hold the types
 */
export function typesFrom(schema) {
  const definitions = schema.$defs ?? {};
  const types = Object.keys(definitions)
    .sort()
    .map((name) => `${comment(definitions[name], '  ')}  type ${name} = ${typeOf(definitions[name], '  ')};\n`);
  return [
    '// Made from docs/desk.schema.json by tools/types.mjs. Change the Rust types, not this file.\n',
    'declare namespace Desk {\n',
    types.join('\n'),
    '}\n',
  ].join('');
}

/**
 * The type that a schema describes. A form of schema that is not known here stops the run, so that no `any` slips in.
 * @param {any} schema
 * @param {string} indent
 * @returns {string}
 */
function typeOf(schema, indent) {
  const parts = [];
  if (schema.$ref) parts.push(schema.$ref.replace('#/$defs/', ''));
  if (schema.const !== undefined) return JSON.stringify(schema.const);
  if (schema.enum) return schema.enum.map((/** @type {unknown} */ one) => JSON.stringify(one)).join(' | ');
  const choice = schema.oneOf ?? schema.anyOf;
  if (choice) {
    const options = choice.map((/** @type {any} */ one) => typeOf(one, `${indent}  `));
    return options.length > 2
      ? options.map((/** @type {string} */ one) => `\n${indent}  | ${one}`).join('')
      : options.join(' | ');
  }
  if (Array.isArray(schema.type)) {
    return schema.type.map((/** @type {string} */ type) => typeOf({ ...schema, type }, indent)).join(' | ');
  }
  if (schema.type === 'object') parts.push(objectType(schema, indent));
  else if (schema.type) parts.push(plainType(schema, indent));
  if (parts.length === 0) throw new Error(`this form of schema is not known: ${JSON.stringify(schema)}`);
  return parts.join(' & ');
}

/**
 * @param {any} schema
 * @param {string} indent
 */
function objectType(schema, indent) {
  const required = new Set(schema.required ?? []);
  const members = Object.entries(schema.properties ?? {}).map(([name, member]) => {
    const inner = `${indent}  `;
    return `${comment(member, inner)}${inner}${name}${required.has(name) ? '' : '?'}: ${typeOf(member, inner)};\n`;
  });
  if (members.length > 0) return `{\n${members.join('')}${indent}}`;
  const values = schema.additionalProperties;
  return values && values !== true ? `Record<string, ${typeOf(values, indent)}>` : '{}';
}

/**
 * @param {any} schema
 * @param {string} indent
 */
function plainType(schema, indent) {
  switch (schema.type) {
    case 'string':
    case 'boolean':
    case 'null':
      return schema.type;
    case 'number':
    case 'integer':
      return 'number';
    case 'array':
      return `Array<${typeOf(schema.items, indent)}>`;
    default:
      throw new Error(`this type is not known: ${schema.type}`);
  }
}

/**
 * @param {any} schema
 * @param {string} indent
 */
function comment(schema, indent) {
  return schema.description
    ? `${indent}/** ${schema.description.replaceAll('\n', ' ').replaceAll('*/', '* /')} */\n`
    : '';
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const types = typesFrom(JSON.parse(readFileSync(process.env.DESK_SCHEMA ?? schemaFile, 'utf8')));
  if (process.argv.includes('--print')) process.stdout.write(types);
  else writeFileSync(typesFile, types);
}
