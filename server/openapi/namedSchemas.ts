import { z } from 'zod';
import {
  currentSessionSchema,
  sessionResponseSchema,
  sessionUserSchema,
  userDirectorySchema,
  userListSchema,
  userSchema,
} from '../../shared/schemas/account.js';
import { acquisitionSheetSchema } from '../../shared/schemas/acquisitionSheet.js';
import { batchPageSchema, batchSchema } from '../../shared/schemas/batch.js';
import {
  capturePageSchema,
  captureRowSchema,
  captureSchema,
  spectrumSchema,
  uploadResponseSchema,
} from '../../shared/schemas/capture.js';
import { errorBodySchema } from '../../shared/schemas/common.js';
import { csvLayoutSchema } from '../../shared/schemas/csvLayout.js';
import { decisionSchema } from '../../shared/schemas/decision.js';
import { memberListSchema, memberSchema, projectListSchema, projectSchema } from '../../shared/schemas/project.js';
import { channelScreenSchema } from '../../shared/schemas/screening.js';
import {
  demoMailDetailSchema,
  demoMailListSchema,
  demoMailSchema,
  healthSchema,
  mailListSchema,
  mailMessageSchema,
  publicSettingsSchema,
  startPageSchema,
} from '../../shared/schemas/system.js';
import {
  thresholdsResponseSchema,
  thresholdsSchema,
  thresholdsVersionSchema,
} from '../../shared/schemas/thresholds.js';

/** Schemas of answers that get a name of their own in the document; all others are written out where they occur. */
const names: Record<string, z.ZodType> = {
  AcquisitionSheet: acquisitionSheetSchema,
  Batch: batchSchema,
  BatchPage: batchPageSchema,
  Capture: captureSchema,
  CapturePage: capturePageSchema,
  CaptureRow: captureRowSchema,
  ChannelScreen: channelScreenSchema,
  CsvLayout: csvLayoutSchema,
  CurrentSession: currentSessionSchema,
  Decision: decisionSchema,
  DemoMail: demoMailSchema,
  DemoMailDetail: demoMailDetailSchema,
  DemoMailList: demoMailListSchema,
  Error: errorBodySchema,
  Health: healthSchema,
  MailList: mailListSchema,
  MailMessage: mailMessageSchema,
  Member: memberSchema,
  MemberList: memberListSchema,
  Project: projectSchema,
  ProjectList: projectListSchema,
  PublicSettings: publicSettingsSchema,
  Session: sessionResponseSchema,
  SessionUser: sessionUserSchema,
  Spectrum: spectrumSchema,
  StartPage: startPageSchema,
  Thresholds: thresholdsSchema,
  ThresholdsResponse: thresholdsResponseSchema,
  ThresholdsVersion: thresholdsVersionSchema,
  UploadResponse: uploadResponseSchema,
  User: userSchema,
  UserDirectory: userDirectorySchema,
  UserList: userListSchema,
};

export const namedSchemas = z.registry<{ id: string }>();
for (const [id, schema] of Object.entries(names)) namedSchemas.add(schema, { id });
