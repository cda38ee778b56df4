import { expect, test } from 'vitest';
import { bearing, decimalPlace, fixed, margin, megahertz, metres, percent, signed } from './format';

test.each([
  [fixed(-0.04, 1), '0.0'],
  [fixed(-7.94, 1), '−7.9'],
  [signed(37), '+37.0'],
  [signed(0), '0.0'],
  [signed(-0.0449), '0.0'],
  [signed(-148.25), '−148.3'],
  [margin(2.46395), '+2.4'],
  [margin(-9.71), '−9.8'],
  [margin(8.2), '+8.2'],
  [margin(0.04), '0.0'],
  [percent(0.99999), '> 99.9 %'],
  [percent(0.9951), '99.5 %'],
  [percent(0.604), '60 %'],
  [percent(0.0004), '< 0.1 %'],
  [metres(16), '16'],
  [metres(17.5), '17.5'],
  [metres(100), '100'],
  [bearing(359.96), '0.0'],
  [bearing(-46.2), '313.8'],
  [megahertz(151.7375e6), '151.7375'],
  [megahertz(400e6), '400'],
  [decimalPlace(47.58295, -20.073), '47.58295 N, 20.07300 W'],
  [decimalPlace(-33.5, 181), '33.50000 S, 179.00000 W'],
])('%s is %s', (got, want) => expect(got).toBe(want));
