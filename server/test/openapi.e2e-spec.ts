import { readFileSync } from 'node:fs';
import { API_DOCUMENT_PATH, describeApi } from '../src/openapi';

interface ApiDocument {
  readonly paths: Record<
    string,
    Record<string, { operationId?: string; responses: Record<string, unknown> }>
  >;
}

describe('the API’s document', () => {
  it('is the one that is committed: node server/dist/openapi.js writes it', async () => {
    expect(await describeApi()).toBe(readFileSync(API_DOCUMENT_PATH, 'utf8'));
  });

  it('gives each operation a name of its own and says what it answers', () => {
    const { paths } = JSON.parse(readFileSync(API_DOCUMENT_PATH, 'utf8')) as ApiDocument;
    const operations = Object.values(paths).flatMap((methods) => Object.values(methods));
    const names = operations.map(({ operationId }) => operationId);
    expect(new Set(names).size).toBe(operations.length);
    for (const { operationId, responses } of operations) {
      expect({ operationId, isAnswered: Object.keys(responses).some((status) => /^2/.test(status)) }).toEqual(
        {
          operationId,
          isAnswered: true,
        },
      );
    }
  });
});
