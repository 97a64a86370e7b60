import { Organisation } from '@/models/organisation';
import { newPublicId } from '@/models/publicId';
import { Setting } from '@/models/setting';
import { unitOfWork } from '@/models/unitOfWork';
import { User } from '@/models/user';
import { hashPassword } from '@/auth/password';
import { type Actor, SERVER } from '@/auth/actor';
import type { Role } from '@/auth/permissions';
import type { SweepChoice, SweepView } from '@/schemas/sweep';
import { enterCalibration, enterEquipment } from '@/services/enterEquipment';
import { enterLimitLine, enterLimitSet } from '@/services/enterLimits';
import { enterSignalPath } from '@/services/enterSignalPath';
import { createBooking } from '@/services/bookings';
import { createJob } from '@/services/jobs';
import { keepSweep } from '@/services/keepSweep';
import { addPhoto } from '@/services/photos';
import { enterPosition } from '@/services/positions';
import { invitePerson } from '@/services/people';
import { createProduct } from '@/services/products';
import { createSample } from '@/services/samples';
import { signIn } from '@/services/sessions';
import { createSweepFile } from '@/services/sweepFiles';
import { createUser } from '@/services/users';
import { cookieOf, PASSWORD } from '../auth/people';

export interface Somebody {
  actor: Actor;
  cookie: string;
}

/**
 * A small lab: a manager, a technician, a designer of the client whose sample was measured and one of another client;
 * a radiated path of antenna, cable and preamplifier with flat tables, a quasi-peak limit of 40 and 47 dBµV/m at 3 m
 * (CISPR 32:2015 Table A.4, class B), and one kept run.
 */
export async function enterWorld() {
  const organisation = (kind: 'lab' | 'client', name: string) =>
    unitOfWork(() => Organisation.create({ publicId: newPublicId(), kind, name, shortName: name }));
  const lab = await organisation('lab', 'Harrow Lane EMC Bench');
  const client = await organisation('client', 'Pell & Orrin Lighting');
  const stranger = await organisation('client', 'Tidewater Pumps');
  await unitOfWork(() =>
    Setting.create({ name: 'lab', value: { name: lab.name, zone: 'Europe/London', jobPrefix: 'HL' } }),
  );
  const passwordHash = await hashPassword(PASSWORD);

  async function person(role: Role, of: Organisation, email: string): Promise<Somebody> {
    const entry = { organisationId: of.publicId, role, name: email.split('@')[0]!, email, password: null };
    const { publicId } = await createUser(SERVER, entry);
    await unitOfWork(() => User.update({ passwordHash }, { where: { publicId } }));
    const { actor, cookie } = await signIn({ email, password: PASSWORD }, { address: '127.0.0.1', agent: 'test' });
    return { actor, cookie: cookieOf(cookie) };
  }
  const manager = await person('manager', lab, 'manager@harrowlane.example');
  const technician = await person('technician', lab, 'technician@harrowlane.example');
  const designer = await person('designer', client, 'designer@pellorrin.example');
  const outsider = await person('designer', stranger, 'designer@tidewater.example');

  const invited = await invitePerson(manager.actor, {
    name: 'Odo Fen',
    email: 'odo@pellorrin.example',
    role: 'designer',
    organisationId: client.publicId,
  });

  const boss = manager.actor;
  const limitLine = await enterLimitLine(boss, {
    key: 'cispr32-b-re-3m',
    name: 'CISPR 32 class B, enclosure, 3 m, quasi-peak',
    document: 'CISPR 32:2012/2015',
    class: 'B',
    port: 'enclosure',
    source: 'CISPR 32 Table A.4 (A4.2)',
    basis: 'verified',
    detector: 'quasi-peak',
    bandwidthHz: 120e3,
    unit: 'dBuV/m',
    distanceM: 3,
    segments: [
      { startHz: 30e6, stopHz: 230e6, startLimit: 40, stopLimit: 40, over: 'log-frequency' },
      { startHz: 230e6, stopHz: 1e9, startLimit: 47, stopLimit: 47, over: 'log-frequency' },
    ],
  });
  const set = { name: 'CISPR 32 class B radiated, 3 m', port: 'enclosure' as const, distanceM: 3, lines: [limitLine] };
  const limitSet = await enterLimitSet(boss, set);

  const flat = async (identifier: string, quantity: 'antenna-factor' | 'loss' | 'gain', valueDb: number) => {
    const row = await enterEquipment(boss, { identifier, role: quantity, description: identifier, state: 'in-use' });
    const table = {
      name: `${identifier} table 1`,
      quantity,
      polarisation: null,
      distanceM: null,
      source: 'made for tests',
    };
    const frequenciesHz = [20e6, 1e9];
    const calibration = {
      certificate: `C-${identifier}`,
      laboratory: 'invented',
      calibratedOn: '2020-01-02',
      dueOn: '2099-01-01',
    };
    const [entered] = await enterCalibration(boss, row, {
      ...calibration,
      tables: [{ ...table, frequenciesHz, valuesDb: [valueDb, valueDb] }],
    });
    const tables = { horizontal: null, vertical: null, any: entered!.publicId };
    return { equipmentId: row.publicId, role: quantity, term: quantity.replace('-', ' '), quantity, tables };
  };
  const items = [
    await flat('ANT-1', 'antenna-factor', 14),
    await flat('CBL-1', 'loss', 2),
    await flat('PRE-1', 'gain', 30),
  ];
  const step = (expandedDb: number) => [{ startHz: 30e6, stopHz: 1e9, expandedDb }];
  const revision = await enterSignalPath(boss, {
    code: 'P-1',
    name: 'radiated at 3 m',
    port: 'enclosure',
    position: 'A',
    items,
    uncertainty: { prescan: step(6), final: step(5) },
    uncertaintySource: 'made for tests',
  });
  const path = await unitOfWork(async () =>
    (await import('@/models/signalPath')).SignalPath.findByPk(revision.signalPathId),
  );

  const product = await createProduct(boss, {
    organisationId: client.publicId,
    code: 'LD-40',
    name: 'Lumen strip driver',
    description: '',
  });
  const job = await createJob(boss, { productId: product.id, title: 'LD-40', decisionRule: 'guarded-by-u' });
  const sample = await createSample(technician.actor, job.id, { serial: 'P2-0193', firmware: '', description: '' });

  const choice: SweepChoice = {
    purpose: 'prescan',
    port: 'enclosure',
    line: null,
    polarisation: 'horizontal',
    distanceM: 3,
    pathId: path!.publicId,
    limitSetId: limitSet.publicId,
    valuesHold: 'receiver-input',
    alreadyCorrected: null,
    frequencyUnit: 'MHz',
    centreHz: null,
    sweepIndex: null,
    keepPartial: false,
    traces: [{ index: 0, name: 'Peak', unit: 'dBuV', detector: 'peak', rbwHz: 120e3 }],
  };
  const about = {
    stateId: sample.states[0]!.id,
    operatingMode: 'full light',
    heightM: 1,
    heightSwept: true,
    azimuthDeg: 0,
    measuredAt: null,
    trial: null,
  };
  const file = await createSweepFile(technician.actor, sweepFile());
  const text = (name: string, lines: string[]) => ({ name, bytes: new TextEncoder().encode(`${lines.join('\n')}\n`) });
  const tableFile = await createSweepFile(boss, text('cable.csv', ['Frequency (MHz);Loss (dB)', '20;1,9', '1000;2,6']));
  const lineFile = await createSweepFile(boss, text('line.csv', ['Start MHz;Stop MHz;Limit dBuV/m', '30;230;39', '230;1000;47'])); // prettier-ignore
  const run = await keepSweep(technician.actor, { ...choice, ...about, fileId: file.id });
  // A second sample of the same client, whose two runs are moved, voided and judged again.
  const other = await createSample(technician.actor, job.id, { serial: 'P2-0194', firmware: '', description: '' });
  const spares: SweepView[] = [];
  for (const name of ['spare-1.csv', 'spare-2.csv']) {
    const spare = await createSweepFile(technician.actor, sweepFile({ 144: 55, 300: 50 }, name));
    const place = { ...about, stateId: other.states[0]!.id };
    spares.push(await keepSweep(technician.actor, { ...choice, ...place, fileId: spare.id }));
  }
  const position = await enterPosition(boss, {
    code: 'A',
    name: '3 m chamber',
    description: '',
    capabilities: ['radiated', 'shielded-room'],
  });
  const slot = {
    positionId: position.id,
    technicianId: technician.actor.publicId,
    sampleId: sample.id,
    stateId: sample.states[0]!.id,
    work: 'radiated prescan',
  };
  const booking = await createBooking(boss, {
    ...slot,
    startsAt: '2031-01-07T09:00:00Z',
    endsAt: '2031-01-07T11:00:00Z',
  });
  const spareBooking = await createBooking(boss, {
    ...slot,
    startsAt: '2031-01-09T09:00:00Z',
    endsAt: '2031-01-09T11:00:00Z',
  });
  const pictures = ['the table', 'the cables', 'the antenna'];
  const photos = [];
  for (const caption of pictures)
    photos.push(await addPhoto(technician.actor, run.id, preparedPhoto(caption), caption));

  return {
    lab,
    position,
    slot,
    booking,
    spareBooking,
    client,
    stranger,
    manager,
    technician,
    designer,
    outsider,
    invited,
    limitSet,
    limitLine,
    items,
    tableFile,
    lineFile,
    product,
    job,
    sample,
    choice,
    about,
    file,
    run,
    photos,
    other,
    spares,
  };
}

export type World = Awaited<ReturnType<typeof enterWorld>>;

/** 9 701 points from 30 to 1000 MHz, in steps below the RBW, at 30 dBµV, with some readings of your own, in a plain comma file in MHz. */
export function sweepFile(readings: Record<number, number> = { 144: 60.2 }, name = 'sweep.csv') {
  const rows = Array.from({ length: 9701 }, (_, i) => {
    const mhz = (300 + i) / 10;
    return `${mhz.toFixed(3)},${(readings[mhz] ?? 30).toFixed(2)}`;
  });
  const text = ['RBW,120 kHz', 'Detector,Peak', 'Frequency (MHz),Level (dBuV)', ...rows, ''].join('\n');
  return { name, bytes: new TextEncoder().encode(text) };
}

/** What the service is given of a photograph that was opened; its bytes are words here. */
export function preparedPhoto(words: string) {
  const bytes = new TextEncoder().encode(words);
  const picture = { bytes, width: 3, height: 2 };
  return { sha256: '0'.repeat(64), sentBytes: bytes.length, whole: picture, small: picture };
}

/** A PNG of one pixel. */
export function pixel() {
  const base64 = 'iVBORw0KGgoAAAANSUhEUgAAAAEAAAABCAYAAAAfFcSJAAAADUlEQVR42mNk+M9QDwADhgGAWjR9awAAAABJRU5ErkJggg==';
  return { name: 'table.png', bytes: new Uint8Array(Buffer.from(base64, 'base64')) };
}
