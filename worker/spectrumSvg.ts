import type { ChannelScreen } from '../shared/schemas/screening.js';
import type { MeasuredSpectrum } from './measure/ChannelMeasurement.js';

const width = 960;
const height = 420;
const margin = { left: 64, right: 20, top: 34, bottom: 44 };
const ink = '#16243f';
const vermilion = '#d9381e';
const ochre = '#b98216';
const decadesShown = 120;

const escapeXml = (text: string): string =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;');

/** The survey spectrum as a picture: guard band, clear-to frequency, tones; folded ones in vermilion with a mark and a label. */
export function spectrumSvg(screen: ChannelScreen, spectrum: MeasuredSpectrum): string {
  const levels = Array.from(spectrum.densityMean, (density) => 10 * Math.log10(Math.max(density, 1e-40)));
  const topHz = (levels.length - 1) * spectrum.resolutionHz;
  const highestDb = Math.ceil(Math.max(...levels.slice(1)) / 10) * 10 + 5;
  const lowestDb = Math.max(highestDb - decadesShown, Math.floor(Math.min(...levels.slice(1)) / 10) * 10);
  const x = (frequencyHz: number): number => margin.left + (frequencyHz / topHz) * (width - margin.left - margin.right);
  const y = (db: number): number => {
    const share = (highestDb - Math.max(lowestDb, Math.min(highestDb, db))) / Math.max(1, highestDb - lowestDb);
    return margin.top + share * (height - margin.top - margin.bottom);
  };
  const points = levels
    .map((db, bin) => `${x(bin * spectrum.resolutionHz).toFixed(1)},${y(db).toFixed(1)}`)
    .slice(1)
    .join(' ');
  const parts: string[] = [];
  if (screen.guardStartHz !== null) {
    const from = x(screen.guardStartHz);
    parts.push(
      `<rect x="${from.toFixed(1)}" y="${margin.top}" width="${(x(topHz) - from).toFixed(1)}" height="${height - margin.top - margin.bottom}" fill="${ochre}" fill-opacity="0.12"/>`,
      `<text x="${(from + 4).toFixed(1)}" y="${margin.top + 14}" fill="${ochre}">guard band</text>`,
    );
  }
  for (let db = Math.ceil(lowestDb / 20) * 20; db <= highestDb; db += 20) {
    parts.push(
      `<line x1="${margin.left}" x2="${width - margin.right}" y1="${y(db).toFixed(1)}" y2="${y(db).toFixed(1)}" stroke="${ink}" stroke-opacity="0.15"/>`,
      `<text x="${margin.left - 6}" y="${(y(db) + 4).toFixed(1)}" text-anchor="end" fill="${ink}">${db}</text>`,
    );
  }
  for (let tick = 0; tick <= 8; tick++) {
    const frequencyHz = (topHz * tick) / 8;
    parts.push(
      `<text x="${x(frequencyHz).toFixed(1)}" y="${height - margin.bottom + 18}" text-anchor="middle" fill="${ink}">${Number(frequencyHz.toPrecision(4))}</text>`,
    );
  }
  parts.push(`<polyline points="${points}" fill="none" stroke="${ink}" stroke-width="1"/>`);
  if (screen.clearToHz !== null) {
    const at = x(screen.clearToHz).toFixed(1);
    parts.push(
      `<line x1="${at}" x2="${at}" y1="${margin.top}" y2="${height - margin.bottom}" stroke="${ink}" stroke-dasharray="6 4"/>`,
      `<text x="${at}" y="${margin.top - 4}" text-anchor="middle" fill="${ink}">clear to ${Number(screen.clearToHz.toPrecision(5))} Hz</text>`,
    );
  }
  for (const tone of screen.tones) {
    const isFolded = tone.explanation.startsWith('folded') || tone.explanation === 'movedBetweenRates';
    if (tone.frequencyHz > topHz || !isFolded) continue;
    const at = x(tone.frequencyHz);
    parts.push(
      `<path d="M ${at.toFixed(1)} ${margin.top + 22} l -5 -10 h 10 z" fill="${vermilion}"/>`,
      `<text x="${at.toFixed(1)}" y="${margin.top + 10}" text-anchor="middle" fill="${vermilion}">folded</text>`,
    );
  }
  const title = escapeXml(`${screen.file}, channel ${screen.channel}: ${screen.verdict}`);
  return `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${width} ${height}" width="${width}" height="${height}" font-family="Roboto, sans-serif" font-size="12" role="img"><title>${title}</title><rect width="${width}" height="${height}" fill="#fbf8f1"/><text x="${margin.left}" y="16" fill="${ink}" font-weight="500">${title}</text>${parts.join('')}<text x="${width / 2}" y="${height - 8}" text-anchor="middle" fill="${ink}">Frequency (Hz)</text><text x="14" y="${height / 2}" transform="rotate(-90 14 ${height / 2})" text-anchor="middle" fill="${ink}">Density (dB re 1/Hz)</text></svg>\n`;
}
