//! What decided about a sample, in sentences.

use crate::Relation;

use super::{Judgement, Sample, Verdict, measured::MassCheck};

/// What the structures say, then what was measured, then what could not be read.
pub(super) fn of_sample(sample: &Sample, judgement: &Judgement) -> String {
    let mut sentences = Vec::new();
    if !judgement.sentence.is_empty() {
        sentences.push(judgement.sentence.clone());
    }
    match judgement.verdict {
        Verdict::Isomer => sentences.push("A mass cannot tell them apart.".to_owned()),
        Verdict::StereoDiffers if matches!(judgement.relation, Some(Relation::Stereo(_))) => {
            sentences.push("A mass cannot tell stereoisomers apart.".to_owned());
        }
        _ => {}
    }
    sentences.extend(mass(sample, judgement));
    sentences.extend(formula(sample, judgement));
    sentences.extend(missing(sample, judgement));
    let errors: Vec<String> = sample
        .errors()
        .map(|error| format!("Not readable: {}.", error.message.trim_end_matches('.')))
        .collect();
    sentences.extend(errors);
    sentences.join(" ")
}

fn mass(sample: &Sample, judgement: &Judgement) -> Option<String> {
    let mz = sample.measurement.as_ref()?.mz;
    let [label, received] = &judgement.masses;
    let came = received.as_ref();
    Some(match (label, came) {
        (Some(label), came) if label.fits => {
            let came = match came {
                Some(came) if !came.fits => " It does not fit what came.",
                _ => "",
            };
            format!("m/z {mz:.4} fits the label: {}.{came}", expected(label))
        }
        (Some(label), came) => {
            let came = match came {
                Some(came) if came.fits => format!(" It fits what came: {}.", expected(came)),
                Some(_) => " Nor does it fit what came.".to_owned(),
                None => String::new(),
            };
            format!(
                "m/z {mz:.4} does not fit the label: {}.{came}",
                expected(label)
            )
        }
        (None, Some(came)) if came.fits => {
            format!("m/z {mz:.4} fits what came: {}.", expected(came))
        }
        (None, Some(came)) => {
            format!("m/z {mz:.4} does not fit what came: {}.", expected(came))
        }
        (None, None) => return None,
    })
}

/// "[M+H]+ of C8H10N4O2 is expected at 195.0877 (+1.2 ppm)".
fn expected(check: &MassCheck) -> String {
    let peak = if check.is_highest {
        ", its highest peak"
    } else {
        ""
    };
    let off = if check.ppm.abs() < 1e4 {
        format!("{:+.1} ppm", check.ppm)
    } else {
        format!("off by {:+.4}", check.expected * check.ppm * 1e-6)
    };
    format!(
        "{} of {} is expected at {:.4}{peak} ({off})",
        check.adduct, check.component, check.expected
    )
}

fn formula(sample: &Sample, judgement: &Judgement) -> Option<String> {
    let measured = sample.formula.as_ref()?.formula();
    let label = |side: &str, fits| match fits {
        true => format!("The measured formula {measured} is that of {side}."),
        false => format!("The measured formula {measured} is not that of {side}."),
    };
    match judgement.formulae {
        [Some(fits), _] => Some(label("the label", fits)),
        [None, Some(fits)] => Some(label("what came", fits)),
        [None, None] => None,
    }
}

/// What is missing so that more could be said.
fn missing(sample: &Sample, judgement: &Judgement) -> Option<String> {
    let text = match (&sample.label, &sample.received, judgement.verdict) {
        (None, None, _) => "There is no structure, neither on the label nor of what came.",
        (None, Some(_), _) => "The label gives no structure.",
        (Some(_), None, Verdict::Agrees) => {
            "There is no structure of what came: isomers would fit as well."
        }
        (Some(_), None, _) => "There is no structure of what came.",
        (Some(_), Some(_), _) => return None,
    };
    Some(text.to_owned())
}
