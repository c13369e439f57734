import { createTransport } from 'nodemailer';
import type { RouteCase } from './route-case.js';

export const routes: readonly RouteCase[] = [
  { route: 'GET /dev/mail', audience: 'anyone', answers: 200 },
  { route: 'GET /dev/mail/messages.json', audience: 'anyone', answers: 200 },
  {
    route: 'GET /dev/mail/messages/:id/attachments/:index',
    audience: 'anyone',
    answers: 200,
    request: async ({ test }) => {
      const transport = createTransport(test.env.SMTP_URL);
      await transport.sendMail({
        from: 'a@example.com',
        to: 'b@example.com',
        subject: 'Caught with a file',
        text: 'Text',
        attachments: [{ filename: 'a.pdf', contentType: 'application/pdf', content: 'A' }],
      });
      transport.close();
      const { body } = await test.agent().get('/dev/mail/messages.json');
      return { params: { id: body.items[0].id, index: '0' } };
    },
  },
  {
    route: 'GET /dev/mail/messages/:id',
    audience: 'anyone',
    answers: 200,
    request: async ({ test }) => {
      const transport = createTransport(test.env.SMTP_URL);
      await transport.sendMail({
        from: 'a@example.com',
        to: 'b@example.com',
        subject: 'Caught',
        text: 'Text',
      });
      transport.close();
      const { body } = await test.agent().get('/dev/mail/messages.json');
      return { params: { id: body.items[0].id } };
    },
  },
];
