import type { DemoMail, DemoMailDetail, MailMessageDto } from '../../shared/schemas/system.js';
import type { AppDependencies } from '../AppDependencies.js';
import type { MailState } from '../entities/MailMessage.js';
import type { Actor } from '../policies/Actor.js';
import { presentMail } from '../presenters/presentMail.js';
import type { RouteInput } from '../routes/Route.js';
import { DemoMailService } from '../services/DemoMailService.js';
import { MailService } from '../services/MailService.js';

export function createMailController(deps: AppDependencies) {
  const outbox = new MailService(deps);
  const demoMail = new DemoMailService(deps);
  return {
    list: async ({
      query,
    }: RouteInput<unknown, { state?: MailState | undefined }>): Promise<{ items: MailMessageDto[] }> => ({
      items: (await outbox.list(query.state)).map(presentMail),
    }),

    resend: ({ actor, params }: RouteInput<{ mailId: string }, unknown, unknown, Actor>) =>
      outbox.resend(actor, params.mailId),

    listDemo: async (): Promise<{ items: DemoMail[] }> => ({ items: await demoMail.list() }),

    readDemo: ({ params }: RouteInput<{ mailId: string }>): Promise<DemoMailDetail> => demoMail.read(params.mailId),
  };
}
