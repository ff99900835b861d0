// `npm start`: installs what is missing, builds what is stale and runs the server, which makes the data folder and
// the secrets, migrates, and seeds the demo workshop into an empty database. Plain JavaScript: it runs before anything is
// installed. PORT, BIDEWELL_HOST, BIDEWELL_DATA, BIDEWELL_DEMO and the rest (README) go to the server as they are.
import { buildWhatIsStale } from './build.mjs';
import { ensureInstalled } from './install.mjs';
import { fromRoot, runAndFollow, say } from './tools.mjs';

await ensureInstalled();
await buildWhatIsStale();

// Where it listens is the server's own word: another one may answer at the same port, or the port be chosen for it.
runAndFollow(
  process.execPath,
  ['--enable-source-maps', fromRoot('dist-server/main.js')],
  { NODE_ENV: 'production' },
  ({ address, port, demo, everywhere }) => {
    say(`ready at ${address}`);
    if (demo) say('the sign-in page offers each role of the demo workshop by one tap');
    else say('no demo: the first person to open it creates the workshop');
    if (everywhere) say(`listening on every address of this machine, port ${port}`);
  },
);
