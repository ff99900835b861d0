import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { quickEstimate } from '@/calc/index';
import type { EstimateDto } from '@/shared/contract/estimate';
import type { PlanDto } from '@/shared/contract/plan';
import { planForm } from '../../support/forms';
import { makeTestServer, type TestServer } from '../../support/server';
import { stock } from '../../support/stocked';

let server: TestServer;
beforeAll(async () => {
  server = await makeTestServer({ limits: { estimate: { points: 8, durationS: 60 } } });
});
afterAll(() => server.close());

const form = (change: object = {}) => ({
  chemistry: 'nmc',
  groups: '2',
  ratedAh: '66 Ah',
  healthPercent: '92 %',
  spareVolts: '3,620',
  targetVolts: '3.925 V',
  amps: '20',
  maxVolts: '',
  maxWatts: '',
  resistanceMilliohm: '',
  celsius: '21',
  ...change,
});

describe('the quick estimate over the API', () => {
  it('needs no sign-in and gives what the browser computes, to the last digit', async () => {
    const answer = await server.anyone.post('/api/estimates', form()).expect(200);
    const own = quickEstimate({
      chemistry: 'nmc',
      groups: 2,
      ratedAh: 66,
      healthPercent: 92,
      spareVolts: 3.62,
      targetVolts: 3.925,
      amps: 20,
      maxVolts: null,
      maxWatts: null,
      resistanceMilliohm: null,
      celsius: 21,
    });
    expect(answer.body as EstimateDto).toEqual(JSON.parse(JSON.stringify(own)));
  });

  it('says every wrong field at once', async () => {
    const answer = await server.anyone
      .post(
        '/api/estimates',
        form({ ratedAh: '0 Ah', amps: '-5 A', targetVolts: '39.68 V', spareVolts: '', groups: 'two' }),
      )
      .expect(400);
    expect(answer.body.fields).toEqual({
      ratedAh: '0\u00a0Ah is too little. Capacity is more than 0\u00a0Ah.',
      amps: '−5\u00a0A is too little. Current is more than 0\u00a0A.',
      targetVolts: '39.68\u00a0V is over 5\u00a0V, the most for this. A point in the wrong place?',
      spareVolts: 'The voltage is missing. Type it in V.',
      groups: '“two” is no number. Type it like 60.',
    });
  });

  it('asks for no meter, and so does not say that nobody noted one; a plan without meters does', async () => {
    const answer = await server.anyone.post('/api/estimates', form()).expect(200);
    expect((answer.body as EstimateDto).cautions.map(({ code }) => code)).toEqual(['unknown-health']);
    const stocked = await stock(server.agentFor('manager'));
    const planned = await server.agentFor('technician').post('/api/plans', {
      ...planForm(stocked.spare.id),
      meterId: null,
    });
    const { plan } = planned.body as PlanDto;
    expect(plan.cautions.map(({ code }) => code)).toContain('other-meter');
  });

  it('refuses a deep-discharged spare with 200 and the reason', async () => {
    const answer = await server.anyone.post('/api/estimates', form({ spareVolts: '2.41' })).expect(200);
    expect((answer.body as EstimateDto).refusals.map(({ code }) => code)).toEqual(['deep-discharged']);
  });

  it('is throttled by address: the ninth in a minute waits', async () => {
    for (let asked = 4; asked < 8; asked += 1) await server.anyone.post('/api/estimates', form());
    const answer = await server.anyone.post('/api/estimates', form()).expect(429);
    expect(answer.headers['retry-after']).toMatch(/^\d+$/);
  });
});
