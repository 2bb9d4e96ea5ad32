import { defineConfig } from 'vitest/config';

export default defineConfig({ test: { projects: ['common', 'client'] } });
