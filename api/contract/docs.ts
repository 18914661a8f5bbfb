import type { Operation } from './operation.ts';

export const docsOperations: Operation[] = [
  { method: 'get', path: '/api/openapi.json', summary: 'This description, as OpenAPI 3.1', who: 'anyone', answer: 'application/json' },
  { method: 'get', path: '/api/docs', summary: 'This description, as a page to read', who: 'anyone', answer: 'text/html' },
];
