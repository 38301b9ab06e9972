import './api-page.css';
import { useSuspenseQuery, type QueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { LoaderFunctionArgs } from 'react-router-dom';
import { apiDocumentPath, apiQueries } from '../../api/openapi.ts';
import { Page, Panel, TextField, icons } from '../../components/index.ts';
import { load } from '../../forms/load.ts';
import { OperationPart } from './operation-part.tsx';
import { sectionsOf } from './operations.ts';
import { SchemaDefinition } from './schema-view.tsx';

export const apiLoader = (queryClient: QueryClient) => async (args: LoaderFunctionArgs) => {
  await load(args, queryClient.query(apiQueries.document()));
  return null;
};

/** The API of this server, to read: every route, what it takes and what it answers. */
export function ApiPage() {
  const { data: document } = useSuspenseQuery(apiQueries.document());
  const [wanted, setWanted] = useState('');
  const sections = sectionsOf(document, wanted);
  const schemas = Object.entries(document.components?.schemas ?? {});
  return (
    <Page
      title="HTTP API"
      lead={
        <>
          <p>{document.info.description}</p>
          <p>
            All paths stand below <code>{document.servers?.[0]?.url}</code>.
          </p>
        </>
      }
      actions={
        <a href={apiDocumentPath} className="button button-plain" download="openapi.json">
          <icons.download />
          OpenAPI 3.1 as JSON
        </a>
      }
    >
      <TextField
        label="Find a route"
        type="search"
        placeholder="words of its path or summary"
        autoComplete="off"
        value={wanted}
        onChange={setWanted}
      />
      {sections.length === 0 && <p role="status">No route has these words.</p>}
      {sections.map(({ name, description, routes }) => (
        <Panel key={name} title={name}>
          {description && <p className="quiet">{description}</p>}
          <div className="routes">
            {routes.map((route) => (
              <OperationPart key={`${route.method} ${route.path}`} route={route} document={document} />
            ))}
          </div>
        </Panel>
      ))}
      <Panel title="Schemas">
        <p className="quiet">What the routes above refer to by name.</p>
        <div className="routes">
          {schemas.map(([name, schema]) => (
            <SchemaDefinition key={name} name={name} schema={schema} />
          ))}
        </div>
      </Panel>
    </Page>
  );
}
