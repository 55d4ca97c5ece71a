import {
  formatted,
  fromPerson,
  parseNumber,
  QUANTITIES,
  type Quantity,
  toPerson,
  written,
} from './units';

describe('units', () => {
  // Sources: NIST SP 811 (2008) appendix B, values from memory: 1 lbf = 4.448222 N, 1 lbf·ft = 1.355818 N·m,
  // 1 lbf/in = 175.1268 N/m, 1 ft/min = 0.00508 m/s, 1 lb/3000 ft² = 1.6275 g/m².
  const published: readonly [Quantity, number, number][] = [
    ['tension', 4.448222, 1],
    ['torque', 1.355818, 1],
    ['tensionPerWidth', 175.1268, 1],
    ['speed', 0.00508, 1],
    ['basisWeight', 0.0016275, 1],
    ['diameter', 0.0254, 1],
    ['thickness', 25.4e-6, 1],
    ['temperature', 100, 212],
  ];
  for (const [quantity, si, shown] of published) {
    it(`shows ${si} of ${quantity} as ${shown} in US customary`, () => {
      expect(toPerson(quantity, si, 'us') / shown).toBeCloseTo(1, 4);
    });
  }

  // Exact by definition, worked out in closed form (NIST SP 811): 1 lbf = 0.45359237 kg × 9.80665 m/s², 1 in = 0.0254 m.
  const exact: readonly [Quantity, number, number][] = [
    ['tension', 1, 4.4482216152605],
    ['tensionPerWidth', 1, 175.12683524647636],
    ['speed', 100, 0.508],
    ['thickness', 2, 50.8e-6],
    ['basisWeight', 50, 0.08137379],
    ['mass', 1, 0.45359237],
    ['temperature', 32, 0],
  ];
  for (const [quantity, shown, si] of exact) {
    it(`takes ${shown} of US customary ${quantity} for ${si}`, () => {
      const tolerance = 1e-7 * Math.max(1e-6, Math.abs(si));

      expect(Math.abs(fromPerson(quantity, shown, 'us') - si)).toBeLessThan(tolerance);
    });
  }

  it('comes back from what it shows, for every quantity and both families', () => {
    for (const quantity of Object.keys(QUANTITIES) as Quantity[]) {
      for (const system of ['si', 'us'] as const) {
        const back = fromPerson(quantity, toPerson(quantity, 12.34, system), system);

        expect(back).withContext(`${quantity} ${system}`).toBeCloseTo(12.34, 9);
      }
    }
  });

  it('shows line speed in m/min and the roll by its diameter in mm', () => {
    expect(written('speed', 2, 'si')).toBe('120 m/min');
    expect(written('diameter', 1, 'si')).toBe('1000 mm');
  });

  it('shows three digits of gains and times, and a dash for no number', () => {
    expect(formatted('gain', 0.0744, 'si').number).toBe('0.074');
    expect(formatted('time', 2, 'si').number).toBe('2');
    expect(formatted('time', 12.34, 'si').number).toBe('12.3');
    expect(formatted('tension', NaN, 'si').number).toBe('–');
    expect(formatted('tension', -0.2, 'si').number).toBe('0');
  });

  it('reads comma and point, and refuses what is no number', () => {
    expect(parseNumber('0,15')).toBe(0.15);
    expect(parseNumber(' 1.5 ')).toBe(1.5);
    expect(parseNumber('.5')).toBe(0.5);
    for (const text of ['', 'x', '1.2.3', '1e5', '--1']) expect(parseNumber(text)).toBeNull();
  });
});
