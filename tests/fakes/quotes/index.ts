import { portFromEnvironment, runFakeProcess } from '../kit/serve.ts';
import { startQuotesFake } from './start-quotes-fake.ts';

await runFakeProcess('Quotes', () =>
  startQuotesFake({
    port: portFromEnvironment('FAKE_PORT', 4102),
    dataDir: process.env.FAKE_DATA_DIR,
    apiKey: process.env.FAKE_API_KEY,
  }),
);
