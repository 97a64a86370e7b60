import { createHash } from 'node:crypto';
import { Throttled } from '@/errors';
import { MAX_UPLOADS_AT_ONCE, receiveFile } from '@/http/multipart';

const URL = 'http://localhost:3000/api/sweep-files';
const HEAD = '--cut\r\nContent-Disposition: form-data; name="file"; filename="a.csv"\r\n\r\n';

/** A multipart request whose body stays open until `end` is called. */
function open(first: string) {
  let controller!: ReadableStreamDefaultController<Uint8Array>;
  const body = new ReadableStream<Uint8Array>({ start: (given) => void (controller = given) });
  const say = (text: string) => controller.enqueue(new TextEncoder().encode(text));
  say(first);
  const headers = { 'content-type': 'multipart/form-data; boundary=cut' };
  const request = new Request(URL, { method: 'POST', headers, body, duplex: 'half' } as RequestInit);
  return { request, say, end: () => controller.close(), fail: (why: Error) => controller.error(why) };
}

test('the file comes with its name, its bytes and their SHA-256', async () => {
  const form = new FormData();
  form.append('file', new File(['30.0,', '20.1\n'], 'C:\\runs\\a.csv'));
  const file = await receiveFile(new Request(URL, { method: 'POST', body: form }));
  expect([file.name, Buffer.from(file.bytes).toString()]).toEqual(['a.csv', '30.0,20.1\n']);
  expect(file.sha256).toBe(createHash('sha256').update('30.0,20.1\n').digest('hex'));
});

test('as many as it takes are received at once; the next one is told when to come back', async () => {
  const files = Array.from({ length: MAX_UPLOADS_AT_ONCE }, () => open(`${HEAD}30.0,`));
  const received = files.map(({ request }) => receiveFile(request));
  const late = receiveFile(open(HEAD).request);
  await expect(late).rejects.toThrow(Throttled);
  await expect(late).rejects.toMatchObject({ retryAfterS: 5 });
  for (const { say, end } of files) {
    say('20.1\r\n--cut--\r\n');
    end();
  }
  for (const file of await Promise.all(received)) expect(Buffer.from(file.bytes).toString()).toBe('30.0,20.1');
});

test('one that breaks off is refused and gives its place back', async () => {
  for (let i = 0; i <= MAX_UPLOADS_AT_ONCE; i++) {
    const { request, end, fail } = open(`${HEAD}30.0,`);
    const receiving = receiveFile(request);
    if (i % 2) end();
    else fail(new Error('the line is cut'));
    await expect(receiving).rejects.toMatchObject({ issues: [{ pointer: '/file', message: expect.any(String) }] });
  }
});
