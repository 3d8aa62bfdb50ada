import { execFile } from 'node:child_process';
import { PROBLEMS } from '@foldwright/shared/contracts/problems';
import { ROUTE_CONTRACTS } from '@foldwright/shared/contracts/registry';
import request from 'supertest';
import type { TestApp } from '../support/test-app';
import { startTestApp } from '../support/test-app';

/** The validator is an ES module, which jest doesn't load; Node itself does. */
const VALIDATE = `
  import { Validator } from '@seriousme/openapi-schema-validator';
  let text = '';
  for await (const chunk of process.stdin) text += chunk;
  const validator = new Validator();
  const result = await validator.validate(JSON.parse(text));
  process.stdout.write(JSON.stringify({ ...result, version: validator.version }));
`;

function validate(document: unknown): Promise<unknown> {
  return new Promise((resolve, reject) => {
    const child = execFile(process.execPath, ['--input-type=module', '-e', VALIDATE], (error, stdout) => {
      if (error) reject(error);
      else resolve(JSON.parse(stdout));
    });
    child.stdin?.end(JSON.stringify(document));
  });
}

describe('the description of the API', () => {
  let test: TestApp;

  beforeAll(async () => {
    test = await startTestApp();
  });
  afterAll(() => test.close());

  it('is valid OpenAPI 3.1', async () => {
    const { body } = await request(test.app).get('/api/openapi.json').expect(200);
    expect(await validate(body)).toEqual({ valid: true, version: '3.1' });
    expect(await validate({ ...body, paths: { 'no-slash': {} } })).toMatchObject({ valid: false });
  });

  it('describes every route of the registry and none besides', async () => {
    const { body } = await request(test.app).get('/api/openapi.json').expect(200);
    const described = Object.values(body.paths)
      .flatMap((methods) => Object.values(methods as object))
      .map((operation) => String(operation.operationId))
      .sort();
    expect(described).toEqual(ROUTE_CONTRACTS.map(({ id }) => id).sort());
  });

  it('names only problems that exist, and each with its status', async () => {
    for (const contract of ROUTE_CONTRACTS) {
      for (const slug of contract.problems ?? []) expect(Object.keys(PROBLEMS)).toContain(slug);
    }
    const { body } = await request(test.app).get('/api/openapi.json').expect(200);
    expect(body.paths['/api/drafts/{draftId}/commands'].post.responses['409'].description).toContain('draft-moved-on');
    expect(body.paths['/api/parts'].post.parameters.map(({ name }: { name: string }) => name)).toEqual([
      'x-csrf-token',
      'Idempotency-Key',
    ]);
  });
});
