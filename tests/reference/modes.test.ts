import { describe, expect, it } from 'vitest';
import { MODE_FIGURES, modeFigures, periodS } from '../../src/domain/link/modes';
import { MODE_IDS } from '../../src/domain/station/modes';

describe('thresholds in 2500 Hz', () => {
  /** Artemis-DB entry 530, after the protocol's quick-start guide (read in the source); the table is built from these. */
  it.each([
    ['q65-30b', -24.8],
    ['q65-60c', -27.6],
    ['q65-120d', -30.8],
    ['q65-300a', -33.8],
    ['jt65b', -24],
    ['cw', -15],
    ['ssb', 3],
  ])('%s: %s dB', (id, thresholdDb) => {
    expect(modeFigures(id)!.thresholdDb).toBe(thresholdDb);
  });

  /** A period twice as long gathers twice the energy: 3 dB a doubling, within what the code's overhead costs. */
  it('fall by about 3 dB for each doubling of the period', () => {
    const gainDb = modeFigures('q65-30a')!.thresholdDb - modeFigures('q65-120a')!.thresholdDb;
    expect(Math.abs(gainDb - 6)).toBeLessThan(0.5);
  });
});

describe('tone spacing', () => {
  /** Read in the source for the 60 s period: 1.67/3.33/6.67/13.33/26.67 Hz; not used digit by digit. */
  it.each([
    ['q65-60a', 1.67],
    ['q65-60b', 3.33],
    ['q65-60c', 6.67],
    ['q65-60d', 13.33],
    ['q65-60e', 26.67],
  ])('%s: %s Hz', (id, spacingHz) => {
    expect(Math.abs(modeFigures(id)!.resolutionHz! - spacingHz)).toBeLessThan(0.01);
  });

  it('lets 65 tones of every mode fit into the reference bandwidth', () => {
    for (const mode of MODE_FIGURES) {
      if (mode.resolutionHz !== null) expect(mode.resolutionHz * 65).toBeLessThan(3300);
    }
  });
});

describe('modes', () => {
  it('have figures and a source each', () => {
    expect(MODE_FIGURES.map((mode) => mode.id)).toEqual(MODE_IDS);
    for (const mode of MODE_FIGURES) expect(mode.source.length).toBeGreaterThan(10);
  });

  it('leave out the 15 s period, which the echo delay cuts', () => {
    expect(MODE_IDS.some((id) => id.startsWith('q65-15'))).toBe(false);
    expect(modeFigures('q65-15c')).toBeUndefined();
  });

  /** ARRL Handbook 1988 (read in the source): 432 MHz and up 2.5 minutes on CW, 144 MHz one or two. */
  it('have the periods of practice', () => {
    expect(periodS(modeFigures('cw')!, 144)).toBe(60);
    expect(periodS(modeFigures('cw')!, 432)).toBe(150);
    expect(periodS(modeFigures('q65-120d')!, 10_368)).toBe(120);
  });
});
