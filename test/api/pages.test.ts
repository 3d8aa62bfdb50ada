import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import express from 'express';
import request from 'supertest';
import { serveClient } from '@foldwright/server/http/static-client';
import type { TestApp } from '../support/test-app';
import { startTestApp } from '../support/test-app';

describe('pages and headers', () => {
  let test: TestApp;
  let web: string;

  beforeAll(async () => {
    web = await mkdtemp(path.join(tmpdir(), 'foldwright-web-'));
    await writeFile(path.join(web, 'index.html'), '<html><fw-root ngCspNonce="__CSP_NONCE__"></fw-root></html>');
    await writeFile(path.join(web, 'main-ABCDEFGH.js'), 'export {};');
    await mkdir(path.join(web, 'media'));
    await writeFile(path.join(web, 'media/mark.svg'), '<svg xmlns="http://www.w3.org/2000/svg"/>');
    test = await startTestApp({ webDirectory: web });
  });
  afterAll(async () => {
    await test.close();
    await rm(web, { recursive: true, force: true });
  });

  it.each(['/', '/index.html', '/parts', '/parts/7c9e6679-7425-40de-944b-e07fc1f90ae7/outline?x=1'])(
    'answers %s with the page, its nonce in the policy',
    async (address) => {
      const { text, headers } = await request(test.app).get(address).expect(200);
      const nonce = /ngCspNonce="([^"]+)"/.exec(text)?.[1] ?? '';
      expect(nonce.length).toBeGreaterThanOrEqual(22);
      expect(headers['content-security-policy']).toContain(`script-src 'self' 'nonce-${nonce}'`);
      expect(headers['content-security-policy']).toContain(`style-src 'self' 'nonce-${nonce}'`);
      expect(headers['content-security-policy']).not.toContain('unsafe');
      expect(headers['cache-control']).toBe('no-store');
    },
  );

  it('makes a nonce for each request', async () => {
    const [first, second] = await Promise.all([request(test.app).get('/'), request(test.app).get('/')]);
    expect(first.text).not.toBe(second.text);
  });

  it('lets browsers keep what has a hash in its name, and nothing else', async () => {
    const script = await request(test.app).get('/main-ABCDEFGH.js').expect(200);
    expect(script.headers['cache-control']).toBe('public, max-age=31536000, immutable');
    const picture = await request(test.app).get('/media/mark.svg').expect(200);
    expect(picture.headers['cache-control']).toContain('must-revalidate');
  });

  it('has nothing for a file that is missing or lies outside', async () => {
    await request(test.app).get('/main-GONEGONE.js').expect(404);
    const outside = await request(test.app).get('/..%2f..%2fpackage.json');
    expect(outside.status).toBeGreaterThanOrEqual(400);
    expect(outside.text).not.toContain('dependencies');
  });

  it('sends the security headers, and none that would lock out a workshop on plain http', async () => {
    const { headers } = await request(test.app).get('/');
    expect(headers).toMatchObject({
      'x-content-type-options': 'nosniff',
      'x-frame-options': 'DENY',
      'referrer-policy': 'same-origin',
    });
    expect(headers['content-security-policy']).toContain("frame-ancestors 'none'");
    expect(headers['strict-transport-security']).toBeUndefined();
    expect(headers['content-security-policy']).not.toContain('upgrade-insecure-requests');
    expect(headers['x-powered-by']).toBeUndefined();
  });

  it('asks for https only where people come by https, and keeps the cookie there', async () => {
    const secure = await startTestApp({ publicUrl: 'https://bench.example.test' });
    const { headers } = await request(secure.app).get('/api/session').set('x-forwarded-proto', 'https').expect(200);
    expect(headers['strict-transport-security']).toContain('max-age=');
    expect(String(headers['set-cookie'])).toContain('Secure');
    await secure.close();
  });

  it('refuses to start without a place for the nonce', async () => {
    await writeFile(path.join(web, 'index.html'), '<html></html>');
    expect(() => serveClient(express(), web)).toThrow(/no place for its nonce/);
  });

  it('says what is not well, in figures that open no door', async () => {
    const { body } = await request(test.app).get('/api/health').expect(503);
    expect(body.ok).toBe(false);
    expect(body.checks).toMatchObject([
      { name: 'database', ok: true },
      { name: 'queue', ok: true },
      { name: 'worker', ok: false, detail: 'none has started' },
      { name: 'disk', ok: true },
    ]);
    await test.database.pool.query('INSERT INTO worker_heartbeats (worker_id) VALUES (gen_random_uuid())');
    const well = await request(test.app).get('/api/health').expect(200);
    expect(well.body.ok).toBe(true);
    await test.database.pool.query("UPDATE worker_heartbeats SET beat_at = now() - interval '11 seconds'");
    await request(test.app).get('/api/health').expect(503);
  });

  it('slows down an address that asks too often', async () => {
    const strict = await startTestApp({ requestsPerMinute: 5 });
    for (let asked = 0; asked < 5; asked += 1) await request(strict.app).get('/api/session').expect(200);
    const refused = await request(strict.app).get('/api/session').expect(429);
    expect(refused.body.type).toBe('/problems/too-many-requests');
    await strict.close();
  });
});
