import tailwindcss from "@tailwindcss/vite";
import react from "@vitejs/plugin-react";
import { defineConfig } from "vite";

const api = {
  target: `http://127.0.0.1:${process.env.EVENSWING_API_PORT ?? 8081}`,
  // The server compares a request's origin with its host, so the host must stay the page's.
  changeOrigin: false,
};

export default defineConfig({
  root: "web",
  plugins: [react(), tailwindcss()],
  build: { outDir: "../dist/web", emptyOutDir: true, chunkSizeWarningLimit: 600 },
  server: { host: "127.0.0.1", proxy: { "/api": api, "/healthz": api } },
});
