import type { SchemaNode } from '../../api/openapi.ts';
import { limitsOf, typeOf } from './say-schema.ts';

const nameOfRef = (ref: string) => ref.slice(ref.lastIndexOf('/') + 1);
export const anchorOf = (name: string) => `schema-${name}`;

/** Deeper than this an object is told by its type alone. */
const deepest = 6;

/** A schema in words: its type and limits, and under it the fields of an object. */
export function SchemaView({ schema, depth = 0 }: { schema: SchemaNode; depth?: number }) {
  if (schema.$ref !== undefined) return <Reference name={nameOfRef(schema.$ref)} />;
  const choices = schema.anyOf ?? schema.oneOf ?? schema.allOf;
  if (choices !== undefined) {
    const joint = schema.allOf ? 'all of' : 'one of';
    return (
      <span>
        {joint}
        <ul className="schema-choices">
          {choices.map((choice, index) => (
            <li key={index}>
              <SchemaView schema={choice} depth={depth + 1} />
            </li>
          ))}
        </ul>
      </span>
    );
  }
  const limits = limitsOf(schema);
  return (
    <>
      <span className="schema-type">{typeOf(schema)}</span>
      {limits && <span className="quiet"> {limits}</span>}
      {schema.description && <span> {schema.description}</span>}
      {schema.items && (
        <span>
          {' of '}
          <SchemaView schema={schema.items} depth={depth + 1} />
        </span>
      )}
      {schema.properties && depth < deepest && <Fields schema={schema} depth={depth} />}
    </>
  );
}

function Fields({ schema, depth }: { schema: SchemaNode; depth: number }) {
  return (
    <dl className="schema-fields">
      {Object.entries(schema.properties ?? {}).map(([name, field]) => (
        <div key={name}>
          <dt>
            <code>{name}</code>
            {!schema.required?.includes(name) && <span className="quiet"> optional</span>}
          </dt>
          <dd>
            <SchemaView schema={field} depth={depth + 1} />
          </dd>
        </div>
      ))}
    </dl>
  );
}

function Reference({ name }: { name: string }) {
  return (
    <a
      href={`#${anchorOf(name)}`}
      className="link"
      onClick={() => {
        document.getElementById(anchorOf(name))?.setAttribute('open', '');
      }}
    >
      {name}
    </a>
  );
}

/** A schema that others refer to. */
export function SchemaDefinition({ name, schema }: { name: string; schema: SchemaNode }) {
  return (
    <details className="route" id={anchorOf(name)}>
      <summary>
        <code className="route-path">{name}</code>
        <span className="route-summary">{schema.description}</span>
      </summary>
      <div className="route-body">
        <SchemaView schema={{ ...schema, description: undefined }} />
      </div>
    </details>
  );
}
