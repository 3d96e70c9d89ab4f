import { authSecret } from '../../../src/server/auth/secret';

process.stdout.write(authSecret(process.argv[2]));
if (process.connected) process.disconnect();
