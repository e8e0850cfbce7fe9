import { openDatabase } from './db/open';
import { readEnvironment } from './http/environment';
import { serve, stopOnSignals } from './serve';

try {
  const environment = readEnvironment(process.env);
  const database = openDatabase(environment.DATABASE_FILE);
  const serving = await serve(environment, database);
  stopOnSignals(serving);
  console.log(`Seamwright listens at ${serving.address}`);
} catch (error) {
  console.error(error instanceof Error ? error.message : error);
  process.exit(1);
}
