use thimbleworth::{account::{account_text, describe}, compare::compare, example::EXAMPLES, plan::{open, save}};
#[test]
fn show() {
    for e in EXAMPLES {
        println!("=========== {}", e.key);
        let o = open(e.text);
        for p in &o.problems { println!("{p:?}"); }
        if let Some(p) = &o.plan { std::fs::write(format!("/tmp/{}.json", e.key), save(p)).unwrap(); }
        let a = account_text(e.text);
        for p in &a.problems { println!("{:?} {} | {} | {}", p.severity, p.path, p.found, p.need); }
        for (w, wa) in a.workloads.iter().enumerate() {
            let prog = &a.program.as_ref().unwrap().workloads[w];
            for (r, ra) in wa.routes.iter().enumerate() {
                let Some(ra) = ra else { println!("NO ACCOUNT"); continue };
                println!("--- {} / {} {:?} closure {:e}", prog.name, prog.routes[r].name, ra.runs, ra.closure);
                for (f, v) in ra.figures.iter().zip(&ra.values) {
                    let (u, s) = f.measure.written();
                    println!("  {:40} {:>14.4} {u} {:>14.5}", f.id, v * s, ra.per_result(v * s));
                }
                for p in &ra.trace.postings { if p.kg != 0.0 { println!("    {:.6} kg x {:.2}  {}", p.kg, p.runs_a_year, describe(&prog.routes[r], &a.program.as_ref().unwrap().site, p)); } }
            }
            if let Some(c) = compare(&a, w) { for r in c.routes { println!("{}\n better {:?}\n worse {:?}\n doubts {:?}", r.finding, r.better, r.worse, r.doubts); } }
        }
    }
}
