import type { PopulationFigure } from '../../../shared-core/diagnosis/figures.ts';

/** The populations as tab-separated text with full digits, for a spreadsheet. */
export function populationTable(figure: PopulationFigure): string {
  const header = ['line', 'upper level', 'upper energy eV', 'ln population', 'sigma', 'used', 'upper limit'];
  const rows = figure.points.map((point) => [
    point.lineId,
    point.upperLevel,
    point.upperEnergyEv,
    point.lnPopulation ?? '',
    point.lnPopulationSigma ?? '',
    point.used ? 'yes' : 'no',
    point.isUpperLimit ? 'yes' : 'no',
  ]);
  return [header, ...rows].map((cells) => `${cells.map(String).join('\t')}\n`).join('');
}
