import { provideHttpClient } from '@angular/common/http';
import { HttpTestingController, provideHttpClientTesting } from '@angular/common/http/testing';
import { LOCALE_ID } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import { z } from 'zod';
import { ClinicHttp } from './clinic-http';

test('every request says in which language the screen speaks', async () => {
  TestBed.configureTestingModule({
    providers: [
      provideHttpClient(),
      provideHttpClientTesting(),
      { provide: LOCALE_ID, useValue: 'es' },
    ],
  });
  const http = TestBed.inject(ClinicHttp);
  const backend = TestBed.inject(HttpTestingController);
  const answers = [
    http.get('/one', z.unknown()),
    http.post('/one', {}, z.unknown()),
    http.put('/one', {}, z.unknown()),
    http.delete('/one'),
  ];
  const requests = backend.match('/api/clinic/one');
  expect(requests.map(({ request }) => request.headers.get('Accept-Language'))).toEqual([
    'es',
    'es',
    'es',
    'es',
  ]);
  requests.forEach((request) => request.flush({}));
  await Promise.all(answers);
});
