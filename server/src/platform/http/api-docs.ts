import type { NestExpressApplication } from '@nestjs/platform-express';

/** A page of all routes with the schemas they check by, at `/api/docs`; in development only. */
export async function serveApiDocs(app: NestExpressApplication): Promise<void> {
  // Loaded only where it is shown: it is the largest module of the server.
  const { DocumentBuilder, SwaggerModule } = await import('@nestjs/swagger');
  const about = new DocumentBuilder()
    .setTitle('Kerfyard')
    .setDescription(
      'Cookies carry the session. A change needs the header `X-Kerfyard: 1` and comes from the app’s own origin.',
    )
    .build();
  SwaggerModule.setup('docs', app, () => SwaggerModule.createDocument(app, about), { useGlobalPrefix: true });
}
