import { examples } from '@/components/examples';

/** Every component's examples on one page; the browser tests walk it with axe. */
export default function GalleryPage() {
  return (
    <main id="main" className="page">
      <h1>Component examples</h1>
      {examples.map(({ key, title, Show }) => (
        <section key={key} id={key} data-example={key} aria-labelledby={`${key}-title`} className="border-b border-rule-2 py-8">
          <h2 id={`${key}-title`} className="mb-5">
            {title}
          </h2>
          <Show />
        </section>
      ))}
    </main>
  );
}
