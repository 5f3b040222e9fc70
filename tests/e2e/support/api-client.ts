import { setTimeout as pause } from 'node:timers/promises';
import type { APIRequestContext, APIResponse } from '@playwright/test';

type Body = Record<string, unknown>;

export interface ApiClient {
  get(path: string): Promise<Body>;
  post(path: string, data?: Body): Promise<Body>;
  putBytes(path: string, bytes: Buffer): Promise<void>;
  /** Asks every 100 ms until the answer satisfies `done`; fails after a minute. */
  until(path: string, done: (body: Body) => boolean): Promise<Body>;
  status(path: string): Promise<number>;
}

/** The programming interface as a script with a bearer token sees it. Every failure carries the problem's text. */
export function apiClient(request: APIRequestContext, token: string): ApiClient {
  const headers = { authorization: `Bearer ${token}` };
  const read = async (response: APIResponse): Promise<Body> => {
    if (!response.ok())
      throw new Error(`${response.url()} answered ${response.status()}: ${await response.text()}`);
    return (await response.json()) as Body;
  };
  const client: ApiClient = {
    get: async (path) => read(await request.get(`/api/v1/${path}`, { headers })),
    post: async (path, data = {}) => read(await request.post(`/api/v1/${path}`, { headers, data })),
    putBytes: async (path, bytes) => {
      const response = await request.put(`/api/v1/${path}`, {
        headers: { ...headers, 'content-type': 'application/octet-stream' },
        data: bytes,
      });
      if (!response.ok()) throw new Error(`${path} answered ${response.status()}: ${await response.text()}`);
    },
    until: async (path, done) => {
      for (let tried = 0; tried < 600; tried++) {
        const body = await client.get(path);
        if (done(body)) return body;
        await pause(100);
      }
      throw new Error(`${path} did not come to an end within a minute`);
    },
    status: async (path) => (await request.get(`/api/v1/${path}`, { headers })).status(),
  };
  return client;
}
