import type { ApiDocument, AnswerNode } from '../../api/openapi.ts';
import { answerOf, parameterOf, type Route } from './operations.ts';
import { SchemaView } from './schema-view.tsx';

/** One route, closed to its first line until it is opened. */
export function OperationPart({ route, document }: { route: Route; document: ApiDocument }) {
  const { method, path, operation } = route;
  const isOpen = operation.security?.length === 0;
  return (
    <details className="route" id={operation.operationId}>
      <summary>
        <span className="route-method">{method.toUpperCase()}</span>
        <code className="route-path">{path}</code>
        <span className="route-summary">{operation.summary}</span>
      </summary>
      <div className="route-body">
        <p>
          {operation.description} {isOpen ? 'Open to anybody.' : 'Needs a sign-in.'}
        </p>
        <Parameters route={route} document={document} />
        <Body route={route} />
        <Answers answers={operation.responses ?? {}} document={document} />
      </div>
    </details>
  );
}

function Parameters({ route: { operation }, document }: { route: Route; document: ApiDocument }) {
  const parameters = (operation.parameters ?? []).map((one) => parameterOf(one, document));
  if (parameters.length === 0) return null;
  return (
    <section>
      <h3>Parameters</h3>
      <dl className="schema-fields">
        {parameters.map(({ name, in: place, required, description, schema }) => (
          <div key={`${place} ${name}`}>
            <dt>
              <code>{name}</code>{' '}
              <span className="quiet">
                in the {place}
                {required ? '' : ', optional'}
              </span>
            </dt>
            <dd>
              {description && <span>{description.replace(/\.?$/, '. ')}</span>}
              {schema && <SchemaView schema={schema} />}
            </dd>
          </div>
        ))}
      </dl>
    </section>
  );
}

function Body({ route: { operation } }: { route: Route }) {
  const schema = operation.requestBody?.content?.['application/json']?.schema;
  if (schema === undefined) return null;
  return (
    <section>
      <h3>Body, JSON{operation.requestBody?.required === false && ', optional'}</h3>
      <SchemaView schema={schema} />
    </section>
  );
}

interface AnswersProps {
  answers: Readonly<Record<string, AnswerNode>>;
  document: ApiDocument;
}

function Answers({ answers, document }: AnswersProps) {
  return (
    <section>
      <h3>Answers</h3>
      <dl className="schema-fields">
        {Object.entries(answers).map(([status, answer]) => {
          const { description, content, headers } = answerOf(answer, document);
          const isRefusal = Number(status) >= 400;
          return (
            <div key={status}>
              <dt>
                <code>{status}</code>
              </dt>
              <dd>
                {description}
                {headers && Object.keys(headers).length > 0 && (
                  <span className="quiet"> Headers: {Object.keys(headers).join(', ')}.</span>
                )}
                {!isRefusal &&
                  Object.entries(content ?? {}).map(([type, { schema }]) => (
                    <div key={type}>
                      <span className="quiet">{type}</span> {schema && <SchemaView schema={schema} />}
                    </div>
                  ))}
              </dd>
            </div>
          );
        })}
      </dl>
    </section>
  );
}
