import { VueQueryPlugin } from '@tanstack/vue-query';
import { createPinia } from 'pinia';
import { createApp } from 'vue';
import 'vuetify/styles/core';
import '@/styles/index.css';
import '@/router/route-meta.ts';
import { useFieldMessages } from '@shared/contracts/field-messages.ts';
import App from '@/App.vue';
import { connectApi } from '@/api/api-context.ts';
import { makeQueryClient } from '@/plugins/query.ts';
import { makeVuetify } from '@/plugins/vuetify.ts';
import { router } from '@/router/index.ts';
import { useSessionStore } from '@/stores/session.ts';

const cspNonce = document.querySelector('meta[name="csp-nonce"]')?.getAttribute('content') ?? undefined;
const queryClient = makeQueryClient();

const app = createApp(App);
app.use(createPinia());
app.use(VueQueryPlugin, { queryClient });
app.use(makeVuetify(cspNonce));

const session = useSessionStore();
connectApi({
  csrfToken: () => session.csrfToken,
  renewSession: () => session.load(),
  onSessionLost: () => {
    session.forgetUser();
    queryClient.clear();
    const here = router.currentRoute.value;
    if (here.meta.access !== 'public') void router.push({ name: 'sign-in', query: { next: here.fullPath } });
  },
});

useFieldMessages();
app.use(router);
app.mount('#app');
