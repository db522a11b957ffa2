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

// The page's security policy forbids code made from text, which zod would try.
z.config({ jitless: true });

createApp(App).use(createPinia()).use(createAppRouter()).mount('#app');

// The device keeps the app's files, so that it opens without the server.
if (import.meta.env.PROD && 'serviceWorker' in navigator) void navigator.serviceWorker.register('/sw.js');
