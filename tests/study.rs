//! Many cases at once give what each gives alone, in their order, on any number of threads.

use coilstay::assess::assess;
use coilstay::case;
use coilstay::study::{Question, assess_all};

#[test]
fn answers_do_not_depend_on_the_number_of_threads() {
    let questions: Vec<Question> = ["95 mm", "60 mm", "30 mm"]
        .iter()
        .enumerate()
        .map(|(number, working)| {
            let text = case::starter().replace(
                "working_deflection = \"95 mm\"",
                &format!("working_deflection = \"{working}\""),
            );
            let text = text.replace(
                "installed_deflection = \"40 mm\"",
                "installed_deflection = \"10 mm\"",
            );
            Question {
                file: format!("case-{number}.toml"),
                setup: case::parse("case.toml", &text).unwrap().setup,
            }
        })
        .collect();
    let alone: Vec<_> = questions
        .iter()
        .map(|question| assess(&question.setup, &question.file))
        .collect();
    assert_eq!(alone[2].file, "case-2.toml");
    for threads in [1, 2, 7] {
        let pool = rayon::ThreadPoolBuilder::new()
            .num_threads(threads)
            .build()
            .unwrap();
        assert_eq!(
            pool.install(|| assess_all(&questions, &|| {})),
            alone,
            "{threads}"
        );
    }
}
