import { writeEnvExample } from '#server/env-example.ts';

process.stdout.write(writeEnvExample());
