import type { SpectrumDto } from '@shared/schemas/capture.js';
import type { ChannelScreen } from '@shared/schemas/screening.js';

/** What the spectrum picture shows, free of any chart library. */
export interface SpectrumModel {
  spectrum: SpectrumDto;
  screen: ChannelScreen;
  isLogarithmic: boolean;
}

export interface Range {
  fromHz: number;
  toHz: number;
}
