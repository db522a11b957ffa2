import '@fontsource/atkinson-hyperlegible/latin-400.css';
import '@fontsource/atkinson-hyperlegible/latin-700.css';
import '@fontsource/atkinson-hyperlegible/latin-ext-400.css';
import '@fontsource/atkinson-hyperlegible/latin-ext-700.css';
import './assets/theme.css';
import { createPinia } from 'pinia';
import { createApp } from 'vue';
import { z } from 'zod';
import App from './App.vue';
import { createAppRouter } from './router';
import { usePage } from './stores/page';

// The page's security policy forbids code made from text, which zod would try.
z.config({ jitless: true });

const app = createApp(App).use(createPinia()).use(createAppRouter());
// What nobody foresaw is written down for whoever mends it, and told to whoever is in front of it.
app.config.errorHandler = (error) => {
  console.error(error);
  usePage().trouble = 'Something went wrong on this page; what was saved is safe.';
};
app.mount('#app');

// The device keeps the app's files, so that it opens without the server.
if (import.meta.env.PROD && 'serviceWorker' in navigator) void navigator.serviceWorker.register('/sw.js');
