import { describe, expect, it } from 'vitest';
import { homeOf, safePlace } from '#src/app/home.ts';

describe('the first screen of a person', () => {
  it('follows what their roles are for', () => {
    expect(homeOf(['patient'])).toBe('/today');
    expect(homeOf(['therapist', 'clinical-lead'])).toBe('/round');
    expect(homeOf(['on-call-clinician'])).toBe('/round');
    expect(homeOf(['caregiver'])).toBe('/today');
    expect(homeOf(['therapist', 'caregiver'])).toBe('/round');
    expect(homeOf(['administrator'])).toBe('/clinic/people');
    expect(homeOf(['administrator', 'clinical-lead', 'therapist'])).toBe('/round');
    expect(homeOf(['billing'])).toBe('/no-screens');
  });
});

describe('the place to go on to after signing in', () => {
  it.each(['/messages/abc', '/today?x=1'])('is taken when it is inside the application: %s', (place) => {
    expect(safePlace(place)).toBe(place);
  });

  it.each([
    '//evil.example',
    '/\\evil.example',
    'https://evil.example',
    'javascript:alert(1)',
    '/sign-in',
    null,
  ])('is refused when it leads elsewhere: %s', (place) => {
    expect(safePlace(place)).toBeNull();
  });
});
