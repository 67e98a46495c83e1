import { readFile } from 'node:fs/promises';
import { parseArgs } from 'node:util';
import { LogConfigError } from '@stayledger/shared/fatigue/load-history/load-log';
import { AnalyseError } from './analyse/analyse-error.js';
import { analyseLog } from './analyse/analyse-log.js';
import { readConfig } from './analyse/read-config.js';
import { readLogBytes } from './analyse/read-log-bytes.js';
import { writeAnalysis } from './analyse/write-analysis.js';

/**
 * `npm run -s analyse -- LOG --config CONFIG.json`: counts a load log without server or database. One JSON document
 * on standard output, or one line on standard error and exit status 2.
 */
async function main(args: string[]): Promise<void> {
  const { log, configPath } = readArguments(args);
  const config = readConfigText(configPath, await readFile(configPath, 'utf8'));
  const bytes = await readLogBytes(log);
  await writeAnalysis(await analyseLog(config, bytes), process.stdout);
}

function readArguments(args: string[]): { log: string; configPath: string } {
  const usage = 'usage: npm run -s analyse -- LOG --config CONFIG.json';
  try {
    const { values, positionals } = parseArgs({
      args,
      options: { config: { type: 'string' } },
      allowPositionals: true,
    });
    if (positionals.length !== 1 || values.config === undefined) throw new AnalyseError(usage);
    return { log: positionals[0], configPath: values.config };
  } catch (error) {
    if (error instanceof AnalyseError) throw error;
    throw new AnalyseError(`${error instanceof Error ? error.message : String(error)}; ${usage}`);
  }
}

function readConfigText(path: string, text: string): ReturnType<typeof readConfig> {
  try {
    return readConfig(text);
  } catch (error) {
    throw error instanceof AnalyseError ? new AnalyseError(`${path}: ${error.message}`) : error;
  }
}

function describe(error: unknown): string {
  if (error instanceof AnalyseError || error instanceof LogConfigError) return error.message;
  if (error instanceof Error && 'code' in error && typeof error.code === 'string') {
    return error.code.startsWith('Z_') ? `the compressed log is damaged: ${error.message}` : error.message;
  }
  return error instanceof Error ? `${error.name}: ${error.message}` : String(error);
}

main(process.argv.slice(2)).catch((error: unknown) => {
  process.stderr.write(`analyse: ${describe(error).replaceAll(/\s*[\r\n]+\s*/g, ' ')}\n`);
  process.exitCode = 2;
});
