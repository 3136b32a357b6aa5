// Bare Nest 12 on Express: one controller that reads the text and stores it in groups.
import 'reflect-metadata';
import { Body, Controller, Headers, HttpCode, Module, Post } from '@nestjs/common';
import { NestFactory } from '@nestjs/core';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { readAll } from './read-gga.js';
import { FloorStore } from './store.js';

const store = new FloorStore(process.argv[2]!);

@Controller('api/ingest')
class FloorController {
  @Post('nmea')
  @HttpCode(200)
  take(@Body() body: string, @Headers('authorization') authorization: string): Promise<{ accepted: number }> {
    const rows = readAll(body, Number(authorization.slice(7)));
    return new Promise((resolve) => {
      store.add(rows, () => resolve({ accepted: rows.length }));
    });
  }
}

@Module({ controllers: [FloorController] })
class FloorModule {}

const app = await NestFactory.create<NestExpressApplication>(FloorModule, {
  logger: false,
  bodyParser: false,
});
app.useBodyParser('text', { type: 'text/plain', limit: '5mb' });
await app.listen(0, '127.0.0.1');
process.send!({ port: (app.getHttpServer().address() as { port: number }).port });
process.on('message', () => process.send!({ stored: store.stored }));
