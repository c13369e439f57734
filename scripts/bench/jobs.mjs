import pg from 'pg';

const jobs = 10_000;
const warmUps = 5;
const rounds = 40;

/** The list as people use it. */
const lists = [
  ['newest first', ''],
  ['page 200', 'page=200'],
  ['by name', 'sort=name'],
  ['by stage', 'sort=stage'],
  ['one stage', 'stage=install'],
  ['search, few found', 'search=garden+4711'],
  ['search, most found', 'search=weir'],
  ['search, none found', 'search=nothing+like+it'],
];

/**
 * A page of the job list of a company with 10,000 jobs, each with a plan, a summary and a sheet: milliseconds
 * from request to the end of the answer.
 * @param {(line: string) => void} print
 * @param {{ baseUrl: () => Promise<string>, databaseUrl: () => Promise<string> }} context
 */
export async function run(print, context) {
  const baseUrl = await context.baseUrl();
  const email = `bench-${Date.now()}@example.com`;
  const cookie = await signUp(baseUrl, email);
  await fill(await context.databaseUrl(), email);
  print(`${'page of 25'.padEnd(22)}${'median'.padStart(10)}${'p95'.padStart(10)}${'found'.padStart(10)}`);
  for (const [name, query] of lists) {
    /** @type {number[]} */
    const times = [];
    let total = 0;
    for (let round = -warmUps; round < rounds; round += 1) {
      const start = performance.now();
      const response = await fetch(`${baseUrl}/api/jobs?${query}`, { headers: { cookie } });
      const page = /** @type {{ total: number }} */ (await response.json());
      if (!response.ok) throw new Error(`The list answered ${response.status}: ${JSON.stringify(page)}`);
      if (round >= 0) times.push(performance.now() - start);
      total = page.total;
    }
    times.sort((a, b) => a - b);
    const at = (/** @type {number} */ share) => (times[Math.floor(times.length * share)] ?? 0).toFixed(1);
    const row = [`${at(0.5)} ms`, `${at(0.95)} ms`, String(total)].map((cell) => cell.padStart(10)).join('');
    print(`${(name ?? '').padEnd(22)}${row}`);
  }
}

/** @param {string} baseUrl @param {string} email */
async function signUp(baseUrl, email) {
  const response = await fetch(`${baseUrl}/api/auth/sign-up`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({
      companyName: 'A large company',
      name: 'Its owner',
      email,
      password: 'a password for the bench',
    }),
  });
  if (!response.ok) throw new Error(`Signing up answered ${response.status}: ${await response.text()}`);
  return response.headers
    .getSetCookie()
    .map((line) => line.split(';')[0])
    .join('; ');
}

/** Fills the company of the person with this address. @param {string} databaseUrl @param {string} email */
async function fill(databaseUrl, email) {
  const client = new pg.Client({ connectionString: databaseUrl });
  await client.connect();
  try {
    const { rows } = await client.query(
      `SELECT m.company_id FROM memberships m JOIN users u ON u.id = m.user_id WHERE u.email = $1`,
      [email],
    );
    const company = rows[0].company_id;
    const stages = `(enum_range(NULL::job_stage))[1 + i % 8]`;
    const ids = (/** @type {string} */ kind) => `md5('${kind} ' || i || $1::uuid::text)::uuid`;
    const from = `FROM generate_series(1, ${jobs}) AS i`;
    for (const statement of [
      `INSERT INTO clients (id, company_id, name, email)
       SELECT ${ids('client')}, $1::uuid, 'Client ' || i, 'client-' || i || '@example.com' ${from}`,
      `INSERT INTO properties (id, company_id, client_id, name, address)
       SELECT ${ids('property')}, $1::uuid, ${ids('client')}, 'Rear', i || ' Weir Walk, Marlow Bend' ${from}`,
      `INSERT INTO jobs (id, company_id, property_id, name, stage, created_at, updated_at)
       SELECT ${ids('job')}, $1::uuid, ${ids('property')}, 'Garden ' || i, ${stages},
              now() - i * interval '1 hour', now() - (i * 7919 % ${jobs}) * interval '1 hour' ${from}`,
      `INSERT INTO plans (company_id, job_id, version, schema_version, updated_at)
       SELECT $1::uuid, ${ids('job')}, 3, 1, now() - (i * 104729 % ${jobs}) * interval '1 hour' ${from}`,
      `INSERT INTO plan_summaries (company_id, job_id, plan_version, solver_version, faults, cautions, fixtures, summary)
       SELECT $1::uuid, ${ids('job')}, v, '1', i % 4, i % 3, i % 40, '{}' ${from}, generate_series(1, 3) AS v`,
      `INSERT INTO sheets (company_id, job_id, name, view, status)
       SELECT $1::uuid, ${ids('job')}, 'Yard', 'photo', 'ready' ${from}`,
    ])
      await client.query(statement, [company]);
    await client.query('ANALYZE');
  } finally {
    await client.end();
  }
}
