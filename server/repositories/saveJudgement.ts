import type { EntityManager } from 'typeorm';
import type { ChannelScreen } from '../../shared/schemas/screening.js';
import type { CaptureJudgement } from '../../shared/screening/judgeCapture.js';
import { Capture, ChannelResult, FindingRow } from '../entities/index.js';
import { insertFindings } from './saveScreening.js';

interface SaveJudgement {
  captureId: string;
  thresholdsVersion: number;
  judgement: CaptureJudgement;
  screens: ChannelScreen[];
}

/**
 * Replaces what the judge said of a capture; measurements and spectra stay. To be called inside a transaction that holds
 * the capture's row.
 */
export async function saveJudgement(manager: EntityManager, save: SaveJudgement): Promise<void> {
  const { captureId, thresholdsVersion, judgement, screens } = save;
  const { verdict, foldScore, clearToHz, headline } = judgement;
  await manager.update(Capture, { id: captureId }, { verdict, foldScore, clearToHz, headline, thresholdsVersion });
  await manager.delete(FindingRow, { captureId });
  for (const screen of screens) {
    await manager.update(
      ChannelResult,
      { captureId, channelIndex: screen.channel },
      // The typed partial of TypeORM unfolds tuples into objects; JSON is what the column takes.
      { screen: screen as object, verdict: screen.verdict },
    );
    await insertFindings(manager, captureId, screen);
  }
}
