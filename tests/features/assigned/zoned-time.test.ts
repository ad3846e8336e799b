import { describe, expect, it } from 'vitest';

import { fromWallTime, timeZones, toWallTime } from '@/features/assigned/set/zoned-time';

describe('times on the clocks of a zone', () => {
  it('are read as instants, in winter and in summer', () => {
    expect(fromWallTime('2026-01-15T17:00', 'Europe/Berlin')).toBe('2026-01-15T16:00:00.000Z');
    expect(fromWallTime('2026-07-15T17:00', 'Europe/Berlin')).toBe('2026-07-15T15:00:00.000Z');
    expect(fromWallTime('2026-07-15T17:00', 'Asia/Kathmandu')).toBe('2026-07-15T11:15:00.000Z');
    expect(fromWallTime('2026-12-31T23:30', 'Pacific/Kiritimati')).toBe('2026-12-31T09:30:00.000Z');
  });

  it('come back as they were put', () => {
    for (const zone of ['UTC', 'America/St_Johns', 'Australia/Lord_Howe', 'Pacific/Pago_Pago'])
      for (const wall of ['2026-01-01T00:00', '2026-06-30T23:59', '2026-11-01T12:34'])
        expect(toWallTime(fromWallTime(wall, zone) ?? '', zone)).toBe(wall);
  });

  it('that a zone skips in spring move on by what was skipped', () => {
    expect(toWallTime(fromWallTime('2026-03-29T02:30', 'Europe/Berlin') ?? '', 'Europe/Berlin')).toBe(
      '2026-03-29T03:30',
    );
  });

  it('that come twice in autumn are the first of the two', () => {
    expect(fromWallTime('2026-10-25T02:30', 'Europe/Berlin')).toBe('2026-10-25T00:30:00.000Z');
  });

  it('that are none are refused', () => {
    expect(fromWallTime('', 'UTC')).toBeNull();
    expect(fromWallTime('2026-13-01T00:00', 'UTC')).toBeNull();
  });

  it('list the zone in use although the browser does not name it', () => {
    expect(timeZones('Etc/GMT+5')).toContain('Etc/GMT+5');
    expect(timeZones('Europe/Paris').filter((one) => one === 'Europe/Paris')).toHaveLength(1);
  });
});
