// What the bench does beyond plain forms: an edit is sent when a field is left, and
// the page follows. Without this script every form has its own Save button.
"use strict";
document.documentElement.classList.add("scripted");
(() => {
  const isEdit = (form) => form.matches("#bench form[id^='form-']");
  const fieldsOf = (form) => [...form.elements].filter((f) => f.name && f.type !== "hidden" && f.localName !== "button");
  // What the server last wrote into the field.
  const written = (f) => (f.localName === "select" ? ([...f.options].find((o) => o.defaultSelected) || f.options[0])?.value : f.defaultValue);

  let waiting = []; // edits not yet answered, oldest first: {ctx, texts: name -> text}
  const lastSent = (name) => waiting.findLast((w) => name in w.texts)?.texts[name];

  // An edit carries what was changed by hand and is not already on its way: Enter fires
  // both change and submit, and edits can follow one another faster than the answers.
  document.addEventListener("htmx:config:request", (e) => {
    const { ctx } = e.detail, form = ctx.sourceElement, body = ctx.request.body;
    if (!isEdit(form)) return;
    const texts = {};
    for (const f of fieldsOf(form)) {
      if (f.value === (lastSent(f.name) ?? written(f))) body.delete(f.name);
      else texts[f.name] = f.value;
    }
    if (Object.keys(texts).length || body.has("action")) waiting.push({ ctx, texts });
    else e.preventDefault();
  });

  // Undo and redo that have nothing more to do go dead, and the focus with them: it moves to the other one.
  const stepping = new WeakSet(); // requests whose button had the focus
  document.addEventListener("htmx:before:request", (e) => {
    const { ctx } = e.detail;
    if (/^(un|re)do-form$/.test(ctx.sourceElement.id) && ctx.sourceElement.contains(document.activeElement)) stepping.add(ctx);
  });
  const keepPlace = (ctx) => {
    if (stepping.has(ctx) && document.activeElement.matches("body, :disabled")) document.querySelector("#undo-form button:enabled, #redo-form button:enabled")?.focus();
  };

  // When its turn comes, an edit builds on the revision that the answer before it brought,
  // and takes along what is still refused elsewhere, so that it stays marked. What is
  // refused in a list whose places move is left behind.
  document.addEventListener("htmx:before:request", (e) => {
    const { ctx } = e.detail, body = ctx.request.body;
    if (!isEdit(ctx.sourceElement)) return;
    body.set("revision", document.querySelector("#bench [name=revision]").value);
    if (/^(remove|move|insert|duplicate)/.test(body.get("action") || "")) return;
    for (const f of document.querySelectorAll("#bench .field.has-error [name]:not(button, .basis:not(.clashed))")) {
      if (!body.has(f.name)) body.append(f.name, f.type === "hidden" ? f.value : written(f));
    }
  });

  // The buttons that decide between two windows go away when they have done it; the focus goes to the field.
  const returnTo = (ctx) => {
    const name = /^(?:keep|take) (.*)$/.exec(ctx.request.body?.get?.("action") || "")?.[1];
    if (name && document.activeElement === document.body) document.querySelector(`#bench [name="${CSS.escape(name)}"]`)?.focus();
  };

  // A field in which something is typed that is neither saved nor on its way.
  const typedIn = (f) => f?.matches("input, textarea") && f.value !== (lastSent(f.name) ?? written(f));
  const resting = new WeakMap(); // request -> [the field with the focus, its text], when that was not being typed in
  document.addEventListener("htmx:before:request", (e) => {
    const f = document.activeElement;
    if (f?.name && !typedIn(f)) resting.set(e.detail.ctx, [f, f.value]);
  });

  // After the last answer a field shows what is stored ("200 lb" became 90.72), except
  // the one being typed in. A choice made by hand does not follow its attribute by itself.
  const settle = (ctx) => {
    const [rested, text] = resting.get(ctx) || [];
    const busy = (f) => f === document.activeElement && !(f === rested && f.value === text);
    for (const form of document.querySelectorAll("#bench form[method=post]")) {
      for (const f of fieldsOf(form)) {
        if (!busy(f) && lastSent(f.name) === undefined && f.value !== written(f)) f.value = written(f);
      }
    }
  };
  document.addEventListener("htmx:finally:request", (e) => {
    const { ctx } = e.detail;
    waiting = waiting.filter((w) => w.ctx !== ctx);
    const status = ctx.response?.status;
    if (ctx.status === "swapped" && (status < 400 || status === 422)) {
      settle(ctx);
      keepPlace(ctx);
      returnTo(ctx);
      return;
    }
    const said = document.querySelector("#saved");
    if (said) said.textContent = (ctx.request.method === "POST" ? "not saved: " : "") + (status ? `the program answered ${status}` : "the program does not answer");
  });

  // A group whose field was refused opens.
  document.addEventListener("htmx:after:swap", () => {
    const group = document.querySelector("#bench .field.has-error")?.closest("details");
    if (group) group.open = true;
  });

  // Undo and redo by keyboard. A field in which something is typed that is not yet sent
  // undoes its own typing; one that holds what is saved leaves the keys to the project.
  document.addEventListener("keydown", (e) => {
    if (!(e.ctrlKey || e.metaKey) || e.altKey || typedIn(document.activeElement)) return;
    const key = e.key.toLowerCase();
    const id = key === "z" && !e.shiftKey ? "undo-form" : key === "y" || (key === "z" && e.shiftKey) ? "redo-form" : "";
    const button = id && document.querySelector(`#${id} button:not([disabled])`);
    if (button) { e.preventDefault(); button.click(); }
  });
})();
