import { z } from 'zod';
import { idSchema } from '../../shared/schemas/common.js';
import {
  demoMailDetailSchema,
  demoMailListSchema,
  mailListQuerySchema,
  mailListSchema,
} from '../../shared/schemas/system.js';
import type { AppDependencies } from '../AppDependencies.js';
import { createMailController } from '../controllers/mailController.js';
import { route, type Route } from './Route.js';

const params = z.strictObject({ mailId: idSchema });
/** Name of the message's file, without its extension. */
const demoParams = z.strictObject({ mailId: z.string().regex(/^[\w-][\w.-]{0,119}$/) });

export function mailRoutes(deps: AppDependencies): Route[] {
  const controller = createMailController(deps);
  const tag = 'Mail';
  return [
    route({
      method: 'get',
      path: '/mail',
      tag,
      summary: 'The newest mails of the outbox and how they fared',
      access: 'admin',
      query: mailListQuerySchema,
      success: { status: 200, schema: mailListSchema },
      handle: controller.list,
    }),
    route({
      method: 'post',
      path: '/mail/:mailId/resend',
      tag,
      summary: 'Send a mail again that failed or whose fate is unknown',
      access: 'admin',
      params,
      success: { status: 202 },
      errors: { 404: 'NOT_FOUND', 409: 'NOT_RESENDABLE' },
      handle: controller.resend,
    }),
    route({
      method: 'get',
      path: '/demo/mail',
      tag,
      summary: 'Mails caught by the local mail server (demo installations only)',
      access: 'signedIn',
      success: { status: 200, schema: demoMailListSchema },
      errors: { 404: 'NOT_FOUND' },
      handle: controller.listDemo,
    }),
    route({
      method: 'get',
      path: '/demo/mail/:mailId',
      tag,
      summary: 'One caught mail (demo installations only)',
      access: 'signedIn',
      params: demoParams,
      success: { status: 200, schema: demoMailDetailSchema },
      errors: { 404: 'NOT_FOUND' },
      handle: controller.readDemo,
    }),
  ];
}
