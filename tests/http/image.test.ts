import sharp from 'sharp';
import { pictureKind, preparePhoto, receivePhoto } from '@/http/image';

/** A plan drawn for the test: left half red, right half blue, 60 by 40. */
const plan = () =>
  sharp(
    Buffer.from(
      '<svg xmlns="http://www.w3.org/2000/svg" width="60" height="40"><rect width="30" height="40" fill="#f00"/><rect x="30" width="30" height="40" fill="#00f"/></svg>',
    ),
  );

const sent = (bytes: Uint8Array, name = 'table.jpg', fields: Record<string, string> = {}) => {
  const form = new FormData();
  for (const [key, value] of Object.entries(fields)) form.set(key, value);
  form.set('file', new File([new Uint8Array(bytes)], name));
  return new Request('http://localhost:3000/x', { method: 'POST', body: form });
};
const why = (work: Promise<unknown>) =>
  work.then(
    () => 'taken',
    (error: { issues?: { message: string }[]; kind?: string; message: string }) =>
      error.issues?.[0]?.message ?? error.message,
  );

/** GPS of an invented place, a device and a time, as a camera writes them. */
const EXIF = {
  IFD0: { Make: 'Invented', Model: 'Camera', Copyright: 'somebody' },
  IFD3: { GPSLatitudeRef: 'N', GPSLatitude: '51/1 30/1 0/1', GPSLongitudeRef: 'W', GPSLongitude: '0/1 7/1 0/1' },
};

describe('what comes out of a photograph', () => {
  test('place, device and time are gone, and so is every other block of metadata', async () => {
    const jpeg = await plan().jpeg().withExif(EXIF).withIccProfile('p3').toBuffer();
    expect((await sharp(jpeg).metadata()).exif?.includes('Invented')).toBe(true);
    const { whole, small } = await preparePhoto(jpeg);
    for (const { bytes } of [whole, small]) {
      const { exif, icc, xmp, iptc, comments } = await sharp(bytes).metadata();
      expect({ exif, icc, xmp, iptc, comments }).toEqual({});
      expect(bytes.includes('Invented') || bytes.includes('Exif')).toBe(false);
    }
  });

  test.each([
    [1, 60, 40, 'red'],
    [3, 60, 40, 'blue'],
    [6, 40, 60, 'red above'],
    [8, 40, 60, 'blue above'],
  ])(
    'EXIF orientation %i (EXIF 2.32, 4.6.4) becomes an upright %i by %i',
    async (orientation, width, height, corner) => {
      const jpeg = await plan().jpeg({ quality: 100 }).withMetadata({ orientation }).toBuffer();
      const { whole } = await preparePhoto(jpeg);
      expect([whole.width, whole.height]).toEqual([width, height]);
      const { data } = await sharp(whole.bytes)
        .extract({ left: 4, top: 4, width: 1, height: 1 })
        .raw()
        .toBuffer({ resolveWithObject: true });
      expect(data[0]! > data[2]! ? 'red' : 'blue').toBe(corner.split(' ')[0]);
    },
  );

  test('a large one is fitted into 2400 and 480 px, a small one is not blown up; transparent becomes white', async () => {
    const large = await plan().resize(5000, 3000, { fit: 'fill' }).png().toBuffer();
    const { whole, small } = await preparePhoto(large);
    expect([whole.width, whole.height, small.width, small.height]).toEqual([2400, 1440, 480, 288]);
    const clear = await sharp({ create: { width: 8, height: 8, channels: 4, background: '#00000000' } })
      .webp()
      .toBuffer();
    const { whole: white } = await preparePhoto(clear);
    expect([white.width, (await sharp(white.bytes).raw().toBuffer())[0]]).toEqual([8, 255]);
  });
});

describe('what is refused, and why', () => {
  test('what a file is is said by its bytes, never by its name', async () => {
    expect(await why(receivePhoto(sent(await plan().png().toBuffer(), 'sweep.csv')))).toBe('taken');
    expect(await why(receivePhoto(sent(new TextEncoder().encode('<svg xmlns="x"/>'), 'table.jpg')))).toBe(
      'is no JPEG, PNG or WebP picture',
    );
    expect(await why(receivePhoto(sent(await plan().gif().toBuffer())))).toBe('is no JPEG, PNG or WebP picture');
    expect(await why(receivePhoto(sent(await plan().tiff().toBuffer())))).toBe('is no JPEG, PNG or WebP picture');
  });

  test('HEIC is refused with what to do, since the decoder is not part of what is installed', async () => {
    const heic = new TextEncoder().encode('\0\0\0\x18ftypheic\0\0\0\0mif1heic');
    expect(pictureKind(heic)).toBe('heic');
    expect(sharp.format.heif.input.fileSuffix).not.toContain('.heic');
    expect(await why(receivePhoto(sent(heic, 'IMG_1.HEIC')))).toMatch(
      /^is HEIC or AVIF.*set the phone’s camera to JPEG/,
    );
  });

  test('one that is cut off or damaged', async () => {
    const jpeg = await plan().resize(800).jpeg().toBuffer();
    expect(await why(preparePhoto(jpeg.subarray(0, jpeg.length / 2)))).toMatch(/^could not be opened/);
    expect(await why(preparePhoto(new Uint8Array([0xff, 0xd8, 0xff, 0xe0, 1, 2, 3])))).toMatch(/^could not be opened/);
  });

  test('a small file that unfolds to 144 megapixels is not unfolded', async () => {
    const bomb = await sharp({
      create: { width: 12_000, height: 12_000, channels: 3, background: '#888' },
      limitInputPixels: false,
    })
      .png({ compressionLevel: 9 })
      .toBuffer();
    expect(bomb.length).toBeLessThan(2_000_000);
    const before = process.memoryUsage().rss;
    expect(await why(preparePhoto(bomb))).toMatch(/more than 120 megapixels/);
    expect(process.memoryUsage().rss - before).toBeLessThan(100e6);
  }, 60_000);

  test('more than 25 MB is refused by its stated length already', async () => {
    const heavy = new Request('http://localhost:3000/x', {
      method: 'POST',
      headers: { 'content-type': 'multipart/form-data; boundary=x', 'content-length': String(27 * 1024 * 1024) },
      body: 'x',
    });
    expect(await why(receivePhoto(heavy))).toBe('A photograph takes at most 25 MB. Send it in a smaller size.');
  });
});

test('the fields beside the file and the hash of what was sent come along', async () => {
  const bytes = await plan().png().toBuffer();
  const photo = await receivePhoto(sent(bytes, 'a.png', { caption: 'the table' }));
  expect(photo).toMatchObject({ sentBytes: bytes.length, fields: { caption: 'the table' } });
  expect(photo.sha256).toMatch(/^[0-9a-f]{64}$/);
});

test('four large ones at once are all taken, and meanwhile nothing else is kept waiting', async () => {
  const bytes = await plan().resize(6000, 4000, { fit: 'fill' }).jpeg().toBuffer();
  let latest = performance.now();
  let longest = 0;
  const timer = setInterval(() => {
    longest = Math.max(longest, performance.now() - latest);
    latest = performance.now();
  }, 5);
  const answers = await Promise.all(Array.from({ length: 4 }, () => why(receivePhoto(sent(bytes)))));
  clearInterval(timer);
  expect(answers).toEqual(['taken', 'taken', 'taken', 'taken']);
  expect(longest).toBeLessThan(250);
}, 60_000);
