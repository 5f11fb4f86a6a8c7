import type { z } from 'zod';
import { sessionResponseSchema } from '../../shared/schemas/account.js';
import { batchPageSchema, type BatchDto } from '../../shared/schemas/batch.js';
import { capturePageSchema } from '../../shared/schemas/capture.js';
import type { DemoBatch } from './DemoBatch.js';

/** Decides on the demo's captures through the HTTP API, as a reviewer would, once their batch has been screened. */
export class DemoReviewer {
  private token = '';

  constructor(private readonly apiUrl: string) {}

  async signIn(email: string, password: string): Promise<void> {
    const { token } = await this.ask(sessionResponseSchema, 'POST', '/session', { email, password });
    this.token = token;
  }

  /** @returns whether batches of these are still being screened */
  async decide(demoBatches: readonly DemoBatch[]): Promise<boolean> {
    const { items } = await this.ask(batchPageSchema, 'GET', '/batches?limit=200');
    const found = demoBatches.flatMap((demo) => {
      const batch = items.find(({ name }) => name === demo.name);
      return batch ? [{ demo, batch }] : [];
    });
    for (const { demo, batch } of found) {
      if (batch.state === 'review') await this.decideOnBatch(demo, batch);
    }
    return found.some(({ batch }) => batch.state === 'screening');
  }

  /** What has been decided before, here or by a person, stays. */
  private async decideOnBatch(demo: DemoBatch, batch: BatchDto): Promise<void> {
    const { items } = await this.ask(capturePageSchema, 'GET', `/batches/${batch.id}/captures?limit=200`);
    for (const capture of items) {
      const decision = demo.captures.find(({ fileName }) => fileName === capture.fileName)?.decision;
      if (!decision || capture.decision !== null || capture.state !== 'screened') continue;
      await this.send('PUT', `/captures/${capture.id}/decision`, { ...decision, version: 0 });
    }
  }

  private async ask<T>(schema: z.ZodType<T>, method: string, path: string, body?: object): Promise<T> {
    return schema.parse(await (await this.send(method, path, body)).json());
  }

  private async send(method: string, path: string, body?: object): Promise<Response> {
    const response = await fetch(`${this.apiUrl}${path}`, {
      method,
      headers: {
        'Content-Type': 'application/json',
        ...(this.token === '' ? {} : { Authorization: `Bearer ${this.token}` }),
      },
      ...(body ? { body: JSON.stringify(body) } : {}),
    });
    if (!response.ok) throw new Error(`${method} ${path} answered ${response.status}: ${await response.text()}`);
    return response;
  }
}
