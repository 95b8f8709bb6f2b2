//! Near names, and when two names are the same.

/// The form in which names are compared: no case, no spaces, no joins.
pub(super) fn plain(name: &str) -> String {
    name.chars()
        .filter(|letter| letter.is_alphanumeric())
        .flat_map(char::to_lowercase)
        .collect()
}

/// Up to three known names that are near to a given one, nearest first.
pub(super) fn near<'a>(wanted: &str, known: impl IntoIterator<Item = &'a str>) -> Vec<&'a str> {
    let wanted = plain(wanted);
    let mut scored: Vec<(f64, &str)> = known
        .into_iter()
        .map(|name| (likeness(&wanted, &plain(name)), name))
        .filter(|(score, _)| *score > 0.8)
        .collect();
    scored.sort_by(|a, b| b.0.total_cmp(&a.0));
    if let Some((top, _)) = scored.first().copied() {
        scored.retain(|(score, _)| *score >= top - 0.08);
    }
    scored.into_iter().take(3).map(|(_, name)| name).collect()
}

fn likeness(wanted: &str, known: &str) -> f64 {
    // Parts of a long name ("gypsum" for "gypsum plasterboard 13 mm").
    let (short, long) = if wanted.len() < known.len() {
        (wanted, known)
    } else {
        (known, wanted)
    };
    let part = if short.len() >= 3 && long.contains(short) {
        0.85
    } else {
        0.0
    };
    strsim::jaro_winkler(wanted, known).max(part)
}

/// "did you mean ...?", or the list of what there is.
pub(super) fn suggestion<'a>(
    wanted: &str,
    what: &str,
    known: impl IntoIterator<Item = &'a str>,
) -> String {
    let known: Vec<&str> = known.into_iter().collect();
    let near = near(wanted, known.iter().copied());
    if !near.is_empty() {
        return format!("did you mean \"{}\"?", near.join("\" or \""));
    }
    if known.is_empty() {
        return format!("there is no {what} here yet");
    }
    let listed: Vec<&str> = known.iter().take(12).copied().collect();
    let more = if known.len() > listed.len() {
        ", ... (`doorglow catalogue` and docs/scenario.md have all)"
    } else {
        ""
    };
    format!("known: \"{}\"{more}", listed.join("\", \""))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn verify_near_names() {
        let known = ["bedroom", "hall", "gypsum plasterboard 13 mm"];
        assert_eq!(near("bed room", known), ["bedroom"]);
        assert_eq!(near("bedrom", known), ["bedroom"]);
        assert_eq!(near("gypsum", known), ["gypsum plasterboard 13 mm"]);
        assert!(near("kitchen", known).is_empty());
        assert_eq!(plain("Hand's Width"), plain("hands_width"));
    }
}
