import type { Config } from 'tailwindcss';

export default { content: ['./src/**/*.{html,svelte,ts}'], theme: { extend: {} } } satisfies Config;
