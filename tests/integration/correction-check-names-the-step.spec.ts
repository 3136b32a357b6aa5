import { createServer, type AddressInfo } from 'node:net';
import type { CheckReport } from '@hubtack/contracts/corrections/check.js';
import { startCaster, type Caster } from '@hubtack/simulators/caster/caster.js';
import type { CasterFaults } from '@hubtack/simulators/caster/caster-faults.js';
import type { MountPointOptions, StreamFaults } from '@hubtack/simulators/caster/mount-point.js';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { checkSource, testBase, testLogin } from '../harness/check-source.js';

const base = { stream: { kind: 'msm' }, ...testBase, login: testLogin } as const;
const mountPoints: MountPointOptions[] = [
  { ...base, name: 'TANF00', identifier: 'Tannery Flats' },
  { ...base, name: 'TANF01', stream: { kind: 'legacy' }, antennaHeightM: 1.25 },
  { ...base, name: 'QUARB2', latitude: -41.45 },
  { ...base, name: 'TASNET', isNetwork: true },
];
let caster: Caster;
beforeAll(async () => {
  caster = await startCaster({ mountPoints, secondMs: 40 });
});
beforeEach(() => {
  caster.faults = {};
  caster.requests.length = 0;
  for (const { name } of mountPoints) caster.setFaults(name, {});
});
afterAll(() => caster.close());
const check = (change: Partial<Parameters<typeof checkSource>[0]> = {}) =>
  checkSource({ port: caster.port, ...change });

describe('a source that is well', () => {
  it.each([1, 2] as const)('passes every step with version %d, and says what came', async (ntripVersion) => {
    const { report, failed, step } = await check({ ntripVersion });
    expect(report.steps.map(({ step: name, outcome }) => `${name} ${outcome}`)).toEqual([
      'address pass',
      'connection pass',
      'sourceTable pass',
      'mountPoint pass',
      'login pass',
      'data pass',
      'formats pass',
      'position pass',
      'base pass',
    ]);
    expect(failed).toBeNull();
    expect(step('sourceTable').seen).toBe('4 mount points, 1 caster, 1 network.');
    expect(step('mountPoint').seen).toBe('Tannery Flats, RTCM 3.3');
    expect(report.stream).toMatchObject({
      badFrames: 0,
      otherBytes: 0,
      constellations: ['GPS', 'GLONASS', 'Galileo', 'BeiDou'],
    });
    expect(report.stream!.messages.map(({ number }) => number)).toEqual([1005, 1077, 1087, 1097, 1127, 1230]);
    expect(report.base).toMatchObject({
      stationId: 7,
      latitude: expect.closeTo(testBase.latitude, 8),
      longitude: expect.closeTo(testBase.longitude, 8),
      heightM: expect.closeTo(testBase.heightM, 3),
      isVirtual: false,
      movedM: null,
    });
    // 8 mm + 1 ppm and 15 mm + 1 ppm of 11.358 km (common practice).
    expect(report.base!.distanceM).toBeGreaterThan(11_300);
    expect(report.base!.horizontalMm).toBeCloseTo(8 + report.base!.distanceM! / 1000, 3);
    expect(report.base!.verticalMm).toBeCloseTo(15 + report.base!.distanceM! / 1000, 3);
    // Two questions, no more: the table, and the stream. No position was wanted, none was told.
    expect(caster.requests.map(({ mountPoint, positions }) => [mountPoint, positions])).toEqual([
      [null, []],
      ['TANF00', []],
    ]);
    expect(caster.requests[0]!.userAgent).toMatch(/^NTRIP /);
  });
  it('tells of each step as it goes', async () => {
    const seen: string[] = [];
    const onReport = ({ steps }: CheckReport) => {
      const line = steps.map(({ outcome }) => outcome[0]).join('');
      if (seen.at(-1) !== line) seen.push(line);
    };
    await checkSource({ port: caster.port }, onReport);
    expect(seen[0]).toBe('rwwwwwwww');
    expect(seen).toContain('ppppprwww');
    expect(seen.at(-1)).toBe('ppppppppp');
  });
  it('may be a caster of version 1 that is asked in version 2, with a blank line after ICY or without', async () => {
    for (const faults of [{ onlyVersion1: true }, { onlyVersion1: true, noBlankLine: true }]) {
      caster.faults = faults;
      const { failed, report } = await check();
      expect(failed).toBeNull();
      expect(report.stream!.otherBytes).toBe(0);
    }
  });
  it('may show its table to nobody without a login: the stream decides', async () => {
    caster.faults = { tableNeedsLogin: true };
    const { failed, step } = await check();
    expect(failed).toBeNull();
    expect(step('sourceTable').warnings).toEqual([
      'the caster shows its source table to nobody without a login',
    ]);
    expect(step('mountPoint')).toMatchObject({ outcome: 'pass', seen: 'The caster has it.' });
  });
});

describe('a fault of the caster fails the right step', () => {
  const cases: [string, CasterFaults, string, RegExp][] = [
    ['says nothing', { mute: true }, 'sourceTable', /says nothing/],
    ['a banner of 10 MB', { bannerBytes: 10_000_000 }, 'sourceTable', /no caster/],
    ['a table without end', { endlessTable: true }, 'sourceTable', /does not end/],
    ['sends us on', { redirectTo: 'http://elsewhere.example/' }, 'sourceTable', /sends us on to http:/],
    ['a web page', { webPage: true }, 'sourceTable', /web page/],
    ['compressed', { gzip: true }, 'sourceTable', /compressed/],
  ];
  it.each(cases)('%s', async (_what, faults, step, words) => {
    caster.faults = faults;
    const found = await check();
    expect(found.failed).toBe(step);
    expect(found.step(found.failed!).seen).toMatch(words);
    expect(found.step(found.failed!).toTry).not.toBe('');
    expect(found.step('base').outcome).toBe('skipped');
  });
  it.each(['closed', 'kept'] as const)(
    'a table without ENDSOURCETABLE, connection %s, is odd and read',
    async (how) => {
      caster.faults = { tableWithoutEnd: how };
      const { failed, step } = await check({ ntripVersion: 1 });
      expect(failed).toBeNull();
      expect(step('sourceTable').warnings).toEqual(['its end is not marked (no ENDSOURCETABLE)']);
    },
  );
  it('odd records cost no good one', async () => {
    caster.faults = {
      tableText: [
        'STR;TANF00;Tannery, Flats;RTCM 3.3;1005(1);2;GPS;NET;AUS;-41.50;147.25;0;0;"a;b";none;B;N;7200;',
        'STR;EAST;Osten;RTCM 3.3;1005(1);2;GPS;NET;DEU;50.00;357.85;0;0;s;none;N;N;7200;',
        'STR;NOWHERE;Nirgendwo, Straße;RTCM 3.3;1005(1);2;GPS;NET;DEU;0.00;0.00;0;0;s;none;N;N;7200;',
        'STR;SHORT;x',
        'XYZ;what;ever',
        'STR;ODD;x;RTCM 3.3;1005(1);2;GPS;NET;DEU;95.00;10.00;0;0;s;none;N;N;7200;',
        'ENDSOURCETABLE',
        '',
      ].join('\r\n'),
    };
    const { failed, step, report } = await check();
    expect(failed).toBeNull();
    expect(step('sourceTable')).toMatchObject({
      seen: '5 mount points, 0 casters, 0 networks.',
      warnings: ['a record has too few fields', 'a position cannot be one'],
    });
    expect(report.nearest.map(({ mountPoint }) => mountPoint)).toEqual(['TANF00', 'EAST']);
  });
});

describe('a fault of the stream fails the right step', () => {
  const cases: [string, StreamFaults, string, RegExp][] = [
    ['withdrawn', { withdrawn: true }, 'mountPoint', /answers with its source table/],
    ['404', { status: 404 }, 'mountPoint', /does not know TANF00/],
    ['403', { status: 403 }, 'login', /may not use/],
    ['409', { status: 409 }, 'login', /in use already/],
    ['503', { status: 503 }, 'data', /gives no stream/],
    ['silent', { silent: true }, 'data', /nothing comes/],
    ['mute', { mute: true }, 'login', /said nothing/],
    ['stalls', { stallAfterFrames: 12 }, 'data', /stopped after 12 frames/],
    ['is cut', { cutAfterFrames: 12 }, 'data', /closed the stream/],
    ['only garbage', { onlyGarbage: true }, 'data', /no RTCM 3 frame/],
    ['damaged frames', { badCrcEvery: 3 }, 'data', /frames are damaged/],
    ['no base position', { noStation: true }, 'formats', /No base position/],
  ];
  it.each(cases)('%s', async (_what, faults, step, words) => {
    caster.setFaults('TANF00', faults);
    const found = await check();
    expect(found.failed).toBe(step);
    expect(found.step(found.failed!).seen).toMatch(words);
    expect(found.step(found.failed!).toTry).not.toBe('');
  });
  it('garbage between the frames is a warning', async () => {
    caster.setFaults('TANF00', { garbageBytes: 30 });
    const { failed, step, report } = await check();
    expect(failed).toBeNull();
    expect(report.stream!.otherBytes).toBeGreaterThan(0);
    expect(step('data').warnings[0]).toMatch(/bytes lie between the frames/);
  });
  it.each([1, 2] as const)('a wrong login is asked once, version %d', async (ntripVersion) => {
    const { failed, step, report } = await check({ password: 'field-bo0k', ntripVersion });
    expect(failed).toBe('login');
    expect(step('login').seen).toBe('The caster refuses the login.');
    expect(caster.requests.filter(({ outcome }) => outcome === 'refused')).toHaveLength(1);
    expect(JSON.stringify(report)).not.toContain('field-bo0k');
  });
  it('a login that is missing', async () => {
    const { failed, step } = await check({ user: null, password: null });
    expect(failed).toBe('login');
    expect(step('login').seen).toBe('The caster asks for a login.');
  });
  it('formats: MSM where legacy messages are wanted, and the other way about', async () => {
    expect((await check({ expectedFormat: 'legacy' })).failed).toBe('formats');
    const legacy = await check({ mountPoint: 'TANF01', expectedFormat: 'msm' });
    expect(legacy.failed).toBe('formats');
    expect(legacy.step('formats').toTry).toContain('MSM');
    const right = await check({ mountPoint: 'TANF01', expectedFormat: 'legacy' });
    expect(right.failed).toBeNull();
    expect(right.report.base!.antennaHeightM).toBe(1.25);
  });
  it('a base that has not been told where it stands', async () => {
    const nowhere = await startCaster({
      secondMs: 40,
      mountPoints: [{ ...base, name: 'TANF00', heightM: -6_378_000 }],
    });
    const { failed, step } = await check({ port: nowhere.port });
    expect(failed).toBe('base');
    expect(step('base').seen).toContain('no place for a base');
    await nowhere.close();
  });
  it('a base that has moved, or is another, against the last check', async () => {
    const before = { ...testBase };
    expect((await check({ before })).failed).toBeNull();
    caster.setFaults('TANF00', { movedNorthM: 1.5 });
    const moved = await check({ before });
    expect(moved.failed).toBe('base');
    expect(moved.report.base!.movedM).toBeCloseTo(1.5, 1);
    expect(moved.step('base').toTry).toContain('Check into control');
    caster.setFaults('TANF00', { stationId: 8 });
    const other = await check({ before });
    expect(other.failed).toBeNull();
    expect(other.report.base!.stationBefore).toBe(7);
    expect(other.step('base').warnings).toEqual(['the station id was 7 at the last check']);
  });
});

describe('a network that computes a virtual base', () => {
  it('waits for a position: said, with what to switch on', async () => {
    const { failed, step } = await check({ mountPoint: 'TASNET' });
    expect(failed).toBe('position');
    expect(step('position').toTry).toContain('send position');
    expect(step('data').outcome).toBe('skipped');
  });
  it('has nothing to wait for without a place', async () => {
    const { failed, step } = await check({ mountPoint: 'TASNET', sendPosition: true, place: null });
    expect(failed).toBe('position');
    expect(step('position').toTry).toContain('Choose a site or a rover');
  });
  it.each([1, 2] as const)(
    'sends once it has one, version %d; its distance says little',
    async (ntripVersion) => {
      const { failed, step, report } = await check({
        mountPoint: 'TASNET',
        sendPosition: true,
        ntripVersion,
      });
      expect(failed).toBeNull();
      expect(caster.requests.at(-1)!.positions[0]).toMatch(/^\$GPGGA,\d{6}.*,4126\.4\d*,S,14708\.4\d*,E,1,/);
      expect(report.base).toMatchObject({ isVirtual: true, distanceM: 0, horizontalMm: null });
      expect(step('base').warnings[0]).toMatch(/virtual base/);
    },
  );
});

describe('the way there', () => {
  it('a name that does not exist', async () => {
    const { failed, step } = await check({ address: 'castor.pennywort.example' });
    expect(failed).toBe('address');
    expect(step('address').seen).toBe('There is no address of the name castor.pennywort.example.');
  });
  it('private addresses are refused unless allowed', async () => {
    const { failed, step } = await check({ allowPrivate: false });
    expect(failed).toBe('address');
    expect(step('address').seen).toContain('private network');
    expect(caster.requests).toEqual([]);
  });
  it('nobody listens at the port', async () => {
    const unused = createServer();
    await new Promise<void>((resolve) => {
      unused.listen(0, '127.0.0.1', resolve);
    });
    const { port } = unused.address() as AddressInfo;
    await new Promise((resolve) => {
      unused.close(resolve);
    });
    const { failed, step } = await check({ port });
    expect(failed).toBe('connection');
    expect(step('connection').toTry).toContain('2101');
  });
  it('TLS where none is spoken', async () => {
    const { failed, step } = await check({ tls: true });
    expect(failed).toBe('connection');
    expect(step('connection').seen).toMatch(/TLS|failed/);
  });
  it('can be cancelled at once, and leaves nothing open', async () => {
    caster.setFaults('TANF00', { silent: true });
    const cancel = new AbortController();
    let last: CheckReport | null = null;
    const running = checkSource(
      { port: caster.port },
      (report) => {
        last = report;
        if (report.steps[5]!.outcome === 'running') cancel.abort(new Error('enough'));
      },
      cancel.signal,
    );
    await expect(running).rejects.toThrow('enough');
    expect(last!.steps.map(({ outcome }) => outcome)).toEqual([
      ...Array.from({ length: 5 }, () => 'pass'),
      ...Array.from({ length: 4 }, () => 'skipped'),
    ]);
  });
});
