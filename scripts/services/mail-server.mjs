/** The local mail fake: takes every message for anybody and keeps it as an .eml file. Started by mail.mjs. */
import { createWriteStream, renameSync } from 'node:fs';
import { join } from 'node:path';
import { pipeline } from 'node:stream';
import { SMTPServer } from 'smtp-server';

const { FAKE_PORT, FAKE_FOLDER, FAKE_PASSWORD } = process.env;
let count = 0;

const server = new SMTPServer({
  banner: 'Outfold local mail',
  hideSTARTTLS: true,
  allowInsecureAuth: true,
  authMethods: ['PLAIN', 'LOGIN'],
  size: 25 * 1024 * 1024,
  onAuth({ username, password }, session, callback) {
    if (username === 'outfold' && password === FAKE_PASSWORD) callback(null, { user: username });
    else callback(new Error('wrong name or password'));
  },
  onData(stream, session, callback) {
    const name = `${new Date().toISOString().replace(/[:.]/g, '-')}-${process.pid}-${++count}.eml`;
    const path = join(FAKE_FOLDER, name);
    // Shows up under its name only when whole.
    pipeline(stream, createWriteStream(`${path}.part`, { mode: 0o600 }), (error) => {
      if (!error) renameSync(`${path}.part`, path);
      callback(error, 'kept');
    });
  },
});
server.on('error', (error) => {
  console.error(error.message);
  if (error.code === 'EADDRINUSE') process.exit(1);
});
server.listen(Number(FAKE_PORT), '127.0.0.1', () => console.log(`mail fake on 127.0.0.1:${FAKE_PORT}`));
for (const signal of ['SIGTERM', 'SIGINT'])
  process.on(signal, () => {
    server.close(() => process.exit(0));
    setTimeout(() => process.exit(0), 1_000).unref();
  });
