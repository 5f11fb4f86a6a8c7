import { randomUUID } from 'node:crypto';
import { In, type EntityManager } from 'typeorm';
import type { AppDependencies } from '../AppDependencies.js';
import { AuditEntry, Batch, Membership, Project, User } from '../entities/index.js';
import type { Actor } from '../policies/Actor.js';
import { addAuditEntry } from '../services/audit.js';
import { BatchService } from '../services/BatchService.js';
import { ProjectService } from '../services/ProjectService.js';
import { ThresholdsService } from '../services/ThresholdsService.js';
import { UploadService } from '../services/UploadService.js';
import { demoAccounts } from './demoAccounts.js';
import type { DemoBatch } from './DemoBatch.js';
import { demoProjects, type DemoProject } from './demoProjects.js';
import { stageCapture } from './stageCapture.js';

const doneAction = 'filledInDemo';

/**
 * Fills an installation with the invented survey, by the same services that people use: every rule holds for it, and the
 * captures wait for the worker like any others. Once done it never runs again; broken off, it goes on where it was.
 */
export class DemoSeeder {
  constructor(
    private readonly deps: Pick<
      AppDependencies,
      'config' | 'dataSource' | 'logger' | 'passwords' | 'queue' | 'storage'
    >,
    private readonly projects: readonly DemoProject[] = demoProjects,
  ) {}

  /** @returns whether there was anything to do */
  async run(): Promise<boolean> {
    const { manager } = this.deps.dataSource;
    if (await manager.existsBy(AuditEntry, { action: doneAction })) return false;
    await this.addAccounts(manager);
    for (const project of this.projects) await this.addProject(project);
    await addAuditEntry(manager, {
      actor: null,
      entityType: 'project',
      action: doneAction,
      text: 'filled in the demo',
    });
    return true;
  }

  private async addAccounts(manager: EntityManager): Promise<void> {
    const emails = demoAccounts.map(({ email }) => email);
    const known = new Set((await manager.findBy(User, { email: In(emails) })).map(({ email }) => email));
    for (const { email, name, password, isAdmin } of demoAccounts) {
      if (known.has(email)) continue;
      const passwordHash = await this.deps.passwords.hash(password);
      await manager.insert(User, { email, name, isAdmin, passwordHash });
    }
  }

  private async addProject(demo: DemoProject): Promise<void> {
    const { manager } = this.deps.dataSource;
    const { name, description } = demo;
    const administrator = await this.actorOf('ove@marram.example');
    const found = await manager.findOneBy(Project, { name });
    const projectId =
      found?.id ?? (await new ProjectService(this.deps).create(administrator, { name, description })).id;
    for (const [email, roles] of Object.entries(demo.members)) {
      const { userId } = await this.actorOf(email);
      await manager.upsert(Membership, { projectId, userId, roles }, ['projectId', 'userId']);
    }
    const thresholds = new ThresholdsService(this.deps);
    if (demo.thresholds && (await thresholds.read(administrator, projectId)).length === 1) {
      await thresholds.change(await this.actorOf('ove@marram.example'), projectId, demo.thresholds);
    }
    const uploader = await this.actorOf(demo.uploaderEmail);
    for (const batch of demo.batches) await this.addBatch(uploader, projectId, batch);
  }

  private async addBatch(actor: Actor, projectId: string, demo: DemoBatch): Promise<void> {
    const { dataSource, storage } = this.deps;
    const batches = new BatchService(this.deps);
    const found = await dataSource.manager.findOneBy(Batch, { projectId, name: demo.name });
    if (found?.completedAt) return;
    const { name, acquisition } = demo;
    const batchId = found?.id ?? (await batches.create(actor, projectId, { name, acquisition })).id;
    const uploads = new UploadService(this.deps);
    for (const [index, capture] of demo.captures.entries()) {
      // Same seed, same bytes: what an earlier run has stored is recognised and not stored again.
      const file = await stageCapture(capture, demo.seed * 1000 + index, storage.temporaryDir);
      const sheets = JSON.stringify({ [capture.fileName]: capture.acquisition ?? {} });
      const outcome = await uploads.accept(actor, batchId, {
        files: [file],
        fields: new Map([['acquisition', sheets]]),
      });
      const [refused] = outcome.refused;
      if (refused) throw new Error(`The demo's ${refused.fileName} was refused: ${refused.message}`);
    }
    if (demo.isComplete) await batches.complete(actor, batchId);
  }

  /** Somebody of the survey, with the roles they have now. */
  private async actorOf(email: string): Promise<Actor> {
    const { manager } = this.deps.dataSource;
    const { id, name, isAdmin } = await manager.findOneByOrFail(User, { email });
    const memberships = await manager.find(Membership, { where: { userId: id }, relations: { project: true } });
    return {
      userId: id,
      email,
      name,
      isAdmin,
      sessionId: randomUUID(),
      memberships: memberships.map(({ projectId, project, roles }) => ({
        projectId,
        projectName: project.name,
        roles,
      })),
    };
  }
}
