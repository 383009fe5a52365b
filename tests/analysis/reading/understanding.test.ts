import { describe, expect, it } from 'vitest';
import { onlySpectrum, readText } from './read-text.ts';

const values = (text: string) => Array.from(onlySpectrum(text).absorbance ?? []);

describe('numbers', () => {
  it('a decimal comma is settled from the whole file', () => {
    expect(values('nm;A\n400;1,234\n401;1,235\n402;0,5\n')).toEqual([1.234, 1.235, 0.5]);
  });

  it('are read to the printed digit', () => {
    expect(values('nm,A\n400,0.1234567890123457\n401,1.7976931348623157E0\n')).toEqual([
      0.1234567890123457, 1.7976931348623157,
    ]);
  });

  it.each([
    ['1.5E-03', 0.0015],
    ['1.5e-3', 0.0015],
    ['1.5D-03', 0.0015],
    ['\u22120.0125', -0.0125],
    ['\u20130.0125', -0.0125],
    ['-0.0125', -0.0125],
    ['+.5', 0.5],
    ['1.', 1],
    ['-0.000', 0],
    ['1E\u22122', 0.01],
  ])('%s', (printed, value) => {
    expect(values(`nm\tA\n400\t0.25\n401\t${printed}\n402\t0.5\n`)).toEqual([0.25, value, 0.5]);
  });

  it('thousands that are marked off beyond doubt are read and told', () => {
    const { molarAbsorptivity, assumptions } = onlySpectrum(
      'nm;ε (L mol-1 cm-1)\n400;12,345.5\n401;9,876\n402;987.1\n',
    );
    expect(Array.from(molarAbsorptivity ?? [])).toEqual([12_345.5, 9876, 987.1]);
    expect(assumptions.join()).toContain('Thousands are marked off with a comma');
  });

  it('wavelengths with decimals settle what "1,234" means', () => {
    const { molarAbsorptivity } = onlySpectrum('nm;ε (M-1 cm-1)\n400,5;1,234\n401,0;1,300\n');
    expect(Array.from(molarAbsorptivity ?? [])).toEqual([1.234, 1.3]);
  });

  it('a named absorbance settles what "1,234" means, and says so', () => {
    const { absorbance, assumptions } = onlySpectrum('nm;A\n400;1,234\n401;1,300\n');
    expect(Array.from(absorbance ?? [])).toEqual([1.234, 1.3]);
    expect(assumptions.join()).toContain('the comma was read as the decimal sign');
  });
});

describe('missing points', () => {
  it.each([
    'OVER',
    '****',
    '--',
    'inf',
    '-inf',
    'NaN',
    'n/a',
    '',
    '>4.0',
    '> 4.0',
    'over range',
    '#NUM!',
    '1.#INF',
    'Überlauf',
    'saturated',
    '###',
    '1e999',
    'lamp fault',
    '0.1x3',
    '0..12',
  ])('"%s" is a missing point, never a number, and is told', (mark) => {
    const { absorbance, assumptions } = onlySpectrum(`nm;A\n400;0.1\n401;${mark}\n402;0.3\n`);
    expect(Array.from(absorbance ?? [])).toEqual([0.1, Number.NaN, 0.3]);
    expect(assumptions.join()).toContain('1 point');
    expect(assumptions.join()).toContain('line 3');
  });

  it('at the edges of the data they are kept as points', () => {
    expect(values('nm;A\n400;blocked\n401;blocked\n402;0.3\n403;0.2\n404;blocked\n')).toEqual([
      Number.NaN,
      Number.NaN,
      0.3,
      0.2,
      Number.NaN,
    ]);
  });

  it('an absorbance that no photometer measures is over range', () => {
    const { absorbance, assumptions } = onlySpectrum('nm;A\n400;0.1\n401;9999\n402;0.3\n');
    expect(Array.from(absorbance ?? [])).toEqual([0.1, Number.NaN, 0.3]);
    expect(assumptions.join()).toContain('9999');
  });

  it('a transmittance of zero or less has no absorbance', () => {
    const { absorbance, assumptions } = onlySpectrum(
      'nm;%T\n400;10\n401;0.00\n402;-0.1\n403;101\n',
    );
    expect(absorbance?.[0]).toBe(1);
    expect(Array.from(absorbance ?? []).map(Number.isNaN)).toEqual([false, true, true, false]);
    expect(absorbance?.[3]).toBeLessThan(0);
    expect(assumptions.join()).toContain('2 points have a transmittance of zero or less');
  });
});

describe('quantities', () => {
  it.each([
    ['Absorbance', 'absorbance'],
    ['A', 'absorbance'],
    ['Abs', 'absorbance'],
    ['Abs.', 'absorbance'],
    ['AU', 'absorbance'],
    ['A (AU)', 'absorbance'],
    ['Messwert 1 [AU]', 'absorbance'],
    ['Extinktion', 'absorbance'],
    ['Absorption', 'absorbance'],
    ['E', 'absorbance'],
    ['吸光度', 'absorbance'],
    ['absorvância', 'absorbance'],
    ['mono 20 µM, Abs', 'absorbance'],
    ['%T', 'percent-transmittance'],
    ['T%', 'percent-transmittance'],
    ['T (%)', 'percent-transmittance'],
    ['T / %', 'percent-transmittance'],
    ['Percent transmittance', 'percent-transmittance'],
    ['Transmission [%]', 'percent-transmittance'],
    ['Durchlässigkeit in %', 'percent-transmittance'],
    ['T', 'transmittance'],
    ['Transmittance', 'transmittance'],
    ['Transmissionsgrad', 'transmittance'],
    ['ε', 'molar-absorptivity'],
    ['epsilon', 'molar-absorptivity'],
    ['ε / L mol⁻¹ cm⁻¹', 'molar-absorptivity'],
    ['L mol-1 cm-1', 'molar-absorptivity'],
    ['ε (M^-1 cm^-1)', 'molar-absorptivity'],
    ['ε in dm3 mol-1 cm-1', 'molar-absorptivity'],
    ['Molar absorptivity (L·mol⁻¹·cm⁻¹)', 'molar-absorptivity'],
    ['molarer Extinktionskoeffizient', 'molar-absorptivity'],
  ])('%s is %s', (heading, quantity) => {
    expect(onlySpectrum(`nm\t${heading}\n400\t0.25\n401\t0.5\n`).quantity).toBe(quantity);
  });

  it('transmittance becomes absorbance, A = -log10 T', () => {
    expect(values('nm;T\n400;0.1\n401;1\n402;0.01\n')).toEqual([1, 0, 2]);
    expect(values('nm;%T\n400;10\n401;100\n402;1\n')).toEqual([1, 0, 2]);
  });

  it('"transmittance" with values up to 100 is per cent, and says so', () => {
    const { quantity, absorbance, assumptions } = onlySpectrum(
      'nm;Transmittance\n400;10\n401;100\n',
    );
    expect(quantity).toBe('percent-transmittance');
    expect(Array.from(absorbance ?? [])).toEqual([1, 0]);
    expect(assumptions.join()).toContain('read as per cent');
  });

  it('an unnamed quantity of the size of an absorbance is one, and says so', () => {
    const { quantity, assumptions } = onlySpectrum('400;0.1\n401;0.2\n');
    expect(quantity).toBe('absorbance');
    expect(assumptions.join()).toContain('Nothing names the quantity');
  });

  it('a header line on the ordinate names it where the heading does not', () => {
    const text = 'Y axis: %T\nOperator: A\n\nnm;run 1;run 2\n400;10;100\n401;100;10\n';
    const { spectra } = readText(text);
    expect(spectra.map(({ quantity, name }) => [quantity, name])).toEqual([
      ['percent-transmittance', 'run 1'],
      ['percent-transmittance', 'run 2'],
    ]);
    expect(spectra[0]?.assumptions.join()).toContain('taken from line 1');
  });

  it('a row of units under the names gives each trace its own', () => {
    const { spectra } = readText('Wavelength;one;two\nnm;Abs;%T\n400;0.5;10\n401;0.6;100\n');
    expect(spectra.map(({ name, quantity }) => [name, quantity])).toEqual([
      ['one', 'absorbance'],
      ['two', 'percent-transmittance'],
    ]);
    expect(Array.from(spectra[1]?.absorbance ?? [])).toEqual([1, 0]);
  });

  it('a clean file leaves nothing to assume', () => {
    expect(onlySpectrum('Wavelength (nm),Absorbance\n400,0.1\n401,0.2\n').assumptions).toEqual([]);
  });
});

describe('the axis', () => {
  it('a running number first is left out, named or not', () => {
    for (const heading of ['', 'No.,Wavelength (nm),A\n']) {
      const spectrum = onlySpectrum(`${heading}1,250,0.1\n2,251,0.2\n3,252,0.3\n`);
      expect(Array.from(spectrum.wavelengthNm)).toEqual([250, 251, 252]);
      expect(spectrum.assumptions.join()).toContain('running number');
    }
  });

  it('a number before the wavelengths that names no quantity is left out and told', () => {
    const spectrum = onlySpectrum('Cell;Wavelength (nm);A\n1;400;0.5\n1;401;0.6\n');
    expect(Array.from(spectrum.absorbance ?? [])).toEqual([0.5, 0.6]);
    expect(spectrum.assumptions.join()).toContain('"Cell"');
  });

  it('a time column beside the traces is left out and told', () => {
    const spectrum = onlySpectrum('nm;Time (s);A\n400;0.1;0.5\n401;0.2;0.6\n');
    expect(Array.from(spectrum.absorbance ?? [])).toEqual([0.5, 0.6]);
    expect(spectrum.assumptions.join()).toContain('times or temperatures');
  });

  it.each([
    ['Wavenumber (cm-1)', '25000', '20000', [400, 500]],
    ['Wavenumber / cm⁻¹', '20000', '25000', [400, 500]],
    ['Wavelength (µm)', '0.4005', '0.5', [400.5, 500]],
    ['Wavelength (Å)', '4000', '5000', [400, 500]],
  ])('%s is converted and told', (heading, first, second, nm) => {
    const spectrum = onlySpectrum(`${heading};A\n${first};0.25\n${second};0.5\n`);
    expect(Array.from(spectrum.wavelengthNm)).toEqual(nm);
    expect(spectrum.xUnit).not.toBe('nm');
    expect(spectrum.assumptions.join()).toContain('converted to nm');
    const own = Number(first) < Number(second) === !heading.startsWith('Wavenumber');
    expect(Array.from(spectrum.absorbance ?? [])).toEqual(own ? [0.25, 0.5] : [0.5, 0.25]);
  });

  it('photon energies follow Planck', () => {
    const { wavelengthNm } = onlySpectrum('Energy (eV);A\n3.0;0.25\n2.5;0.5\n');
    // hc = 1239.841984… eV nm (SI of 2019); 1e-9 nm is far below any wavelength scale.
    expect(wavelengthNm[0]).toBeCloseTo(413.280_661_444, 9);
  });

  it('a wavelength without a unit is nm, and says so', () => {
    expect(onlySpectrum('Wavelength;A\n400;0.1\n401;0.2\n').assumptions.join()).toContain('as nm');
  });
});

describe('what stands around the data', () => {
  it('settings that look like data are left out and told', () => {
    const spectrum = onlySpectrum(
      'Range;200;800\n2026;12\n5;scans\n\nnm;A\n400;0.1\n401;0.2\n402;0.3\n403;0.2\n404;0.1\n\n2;5\n',
    );
    expect(spectrum.points).toBe(5);
    expect(spectrum.assumptions.join()).toContain('Line 12');
  });

  it('quoted headings may hold the delimiter and quotes', () => {
    const text = '"Wavelength (nm)","mono, 20 µM ""fresh"" Abs"\n400,0.1\n401,0.2\n';
    expect(onlySpectrum(text).name).toBe('mono, 20 µM "fresh" Abs');
  });

  it('blank columns and lines between are passed over', () => {
    const text = ';nm;;A;\n\n;400;;0.1;\n;;;;\n;401;;0.2;\n\n';
    expect(values(text)).toEqual([0.1, 0.2]);
  });

  it('a heading in one piece above columns of blanks still names axis and quantity', () => {
    const spectrum = onlySpectrum('Wavelength nm Transmittance in %\n400 10\n401 100\n');
    expect(spectrum.quantity).toBe('percent-transmittance');
  });
});
