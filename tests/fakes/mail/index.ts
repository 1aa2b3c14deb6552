import { portFromEnvironment, runFakeProcess } from '../kit/serve.ts';
import { startMailFake } from './start-mail-fake.ts';

await runFakeProcess('Mail', () =>
  startMailFake({
    port: portFromEnvironment('FAKE_PORT', 4104),
    smtpPort: portFromEnvironment('FAKE_SMTP_PORT', 4103),
    dataDir: process.env.FAKE_DATA_DIR,
  }),
);
