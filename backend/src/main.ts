import { createApplication } from './application.js';
import { EnvironmentError, parseEnvironment } from './config/environment.js';

try {
  const environment = parseEnvironment(process.env);
  const app = await createApplication(environment);
  await app.listen(environment.PORT, environment.HOST);
} catch (error) {
  if (!(error instanceof EnvironmentError)) throw error;
  console.error(error.message);
  process.exitCode = 1;
}
