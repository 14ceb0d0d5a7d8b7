//! Matrices written and read: each format gives back what it was given.

use cosetta::algebra::formats::read;
use cosetta::algebra::{Element, Field, Matrix};
use cosetta::emit::{Delivery, FORMATS, Form, What, format, write_whole};
use proptest::prelude::*;

fn field(order: u64) -> Field {
    match order {
        2 | 3 | 257 => Field::prime(order).unwrap(),
        4 => Field::with_modulus(2, &[1, 1, 1], true).unwrap(),
        // x^8 + x^4 + x^3 + x^2 + 1, primitive.
        256 => Field::with_modulus(2, &[1, 0, 1, 1, 1, 0, 0, 0, 1], true).unwrap(),
        _ => unreachable!("not used here"),
    }
}

fn delivery(matrix: Matrix) -> Delivery {
    Delivery {
        name: "gauge(4)".into(),
        what: What::CheckMatrix,
        form: Form::AsBuilt,
        field: matrix.field().clone(),
        n: matrix.columns(),
        k: matrix.columns().saturating_sub(matrix.rows()),
        information_positions: None,
        position_names: None,
        notes: vec!["highest power first,\nas sent".into()],
        matrix,
    }
}

fn rows(order: u64, rows: &[&[Element]]) -> Matrix {
    let owned: Vec<Vec<Element>> = rows.iter().map(|row| row.to_vec()).collect();
    Matrix::from_rows(&field(order), rows[0].len(), &owned)
}

fn written(name: &str, matrix: Matrix) -> String {
    let bytes = (format(name).unwrap().write)(&delivery(matrix)).unwrap();
    String::from_utf8(bytes).unwrap()
}

fn says(path: &str, order: u64, bytes: &[u8]) -> String {
    read(path, bytes, &field(order)).unwrap_err().to_string()
}

fn any_matrix() -> impl Strategy<Value = Matrix> {
    let orders = prop::sample::select(vec![2u64, 3, 4, 256, 257]);
    (orders, 1usize..9, 1usize..12).prop_flat_map(|(order, height, width)| {
        let entry = prop_oneof![2 => Just(0), 3 => 0..order as Element];
        prop::collection::vec(entry, height * width).prop_map(move |entries| {
            Matrix::from_fn(&field(order), height, width, |row, column| {
                entries[row * width + column]
            })
        })
    })
}

proptest! {
    #[test]
    fn what_is_written_is_read_again(matrix in any_matrix()) {
        for name in ["mtx", "alist", "npy", "csv", "txt", "json"] {
            let bytes = (format(name).unwrap().write)(&delivery(matrix.clone())).unwrap();
            let again = read(&format!("out/h.{name}"), &bytes, matrix.field());
            prop_assert_eq!(again, Ok(matrix.clone()), "{}", name);
        }
    }

    #[test]
    fn no_bytes_make_a_reader_fail(bytes in prop::collection::vec(any::<u8>(), 0..80), order in prop::sample::select(vec![2u64, 256])) {
        for name in ["mtx", "alist", "npy", "csv", "txt", "json"] {
            let _ = read(&format!("h.{name}"), &bytes, &field(order));
        }
    }

    #[test]
    fn a_damaged_file_is_read_or_refused(matrix in any_matrix(), at in any::<prop::sample::Index>(), byte in any::<u8>(), cut in any::<bool>()) {
        for name in ["mtx", "alist", "npy", "csv", "txt", "json"] {
            let mut bytes = (format(name).unwrap().write)(&delivery(matrix.clone())).unwrap();
            let at = at.index(bytes.len());
            if cut { bytes.truncate(at) } else { bytes[at] = byte }
            if let Ok(read) = read(&format!("h.{name}"), &bytes, matrix.field()) {
                let order = matrix.field().order();
                prop_assert!((0..read.rows()).all(|row| read.row(row).iter().all(|&entry| u64::from(entry) < order)));
            }
        }
    }
}

#[test]
fn a_matrix_without_rows_is_written_where_the_format_has_a_place_for_it() {
    let empty = Matrix::zero(&field(2), 0, 7);
    for name in ["mtx", "alist", "npy", "json"] {
        let bytes = (format(name).unwrap().write)(&delivery(empty.clone())).unwrap();
        assert_eq!(
            read(&format!("h.{name}"), &bytes, &field(2)),
            Ok(empty.clone()),
            "{name}"
        );
    }
    for name in ["csv", "txt", "tex", "mem", "png"] {
        let refusal = (format(name).unwrap().write)(&delivery(empty.clone())).unwrap_err();
        assert!(refusal.contains("take json, npy or mtx"), "{refusal}");
    }
}

#[test]
fn matrix_market_is_as_its_description_says() {
    // Boisvert, Pozo and Remington, NISTIR 5935: banner, comments, size line, triples from 1.
    let text = written("mtx", rows(4, &[&[1, 0, 3], &[0, 2, 0]]));
    assert_eq!(
        text,
        "%%MatrixMarket matrix coordinate integer general\n\
         % check_matrix of gauge(4), as-built\n\
         % n = 3, k = 1\n\
         % over GF(4) with modulus x^2 + x + 1; an entry's digits in base 2 are its coefficients of 1, x, x^2, ..., lowest first\n\
         % highest power first, as sent\n\
         2 3 3\n1 1 1\n1 3 3\n2 2 2\n"
    );
}

#[test]
fn matrix_market_is_read_in_all_its_kinds() {
    let general = rows(3, &[&[1, 0], &[2, 1]]);
    let array = b"%%MatrixMarket matrix array integer general\n%\n\n2 2\n1\n2\n0\n1\n";
    assert_eq!(read("h.mtx", array, &field(3)), Ok(general));
    let symmetric = b"%%matrixmarket MATRIX coordinate integer symmetric\n2 2 2\n1 1 1\n2 1 2\n";
    assert_eq!(
        read("h.mtx", symmetric, &field(3)),
        Ok(rows(3, &[&[1, 2], &[2, 0]]))
    );
    let skew = b"%%MatrixMarket matrix coordinate integer skew-symmetric\n2 2 1\n2 1 2\n";
    assert_eq!(
        read("h.mtx", skew, &field(3)),
        Ok(rows(3, &[&[0, 1], &[2, 0]]))
    );
    let pattern = b"%%MatrixMarket matrix coordinate pattern general\n2 3 2\n1 3\n2 1\n";
    assert_eq!(
        read("h.mtx", pattern, &field(2)),
        Ok(rows(2, &[&[0, 0, 1], &[1, 0, 0]]))
    );
    let triangle = b"%%MatrixMarket matrix array integer symmetric\n2 2\n1 2 0\n";
    assert_eq!(
        read("h.mtx", triangle, &field(3)),
        Ok(rows(3, &[&[1, 2], &[2, 0]]))
    );
}

#[test]
fn alist_is_as_its_description_says() {
    let text = written("alist", rows(2, &[&[1, 0, 1, 1], &[0, 1, 1, 0]]));
    assert_eq!(
        text,
        "4 2\n2 3\n1 1 2 1\n3 2\n1 0\n2 0\n1 2\n1 0\n1 3 4\n2 3 0\n"
    );
    let text = written("alist", rows(4, &[&[1, 0, 3], &[0, 2, 1]]));
    assert_eq!(
        text,
        "3 2 4\n2 2\n1 1 2\n2 2\n1 1 0 0\n2 2 0 0\n1 3 2 1\n1 1 3 3\n2 2 3 1\n"
    );
}

#[test]
fn an_alist_need_not_be_filled_up() {
    let short = b"4 2\n2 3\n1 1 2 1\n3 2\n1\n2\n1 2\n1\n1 3 4\n2 3\n";
    let expected = rows(2, &[&[1, 0, 1, 1], &[0, 1, 1, 0]]);
    assert_eq!(read("h.alist", short, &field(2)), Ok(expected));
}

#[test]
fn npy_is_as_its_description_says() {
    // NumPy Enhancement Proposal 1: magic, version, little-endian header length, dictionary padded
    // with blanks and ended by a line feed so that the data begin at a multiple of 64.
    let bytes =
        (format("npy").unwrap().write)(&delivery(rows(257, &[&[1, 256], &[0, 2]]))).unwrap();
    let mut expected = b"\x93NUMPY\x01\x00\x76\x00".to_vec();
    expected.extend_from_slice(b"{'descr': '<u2', 'fortran_order': False, 'shape': (2, 2), }");
    expected.resize(127, b' ');
    expected.extend_from_slice(b"\n\x01\x00\x00\x01\x00\x00\x02\x00");
    assert_eq!(bytes, expected);
}

#[test]
fn npy_is_read_in_either_order_and_byte_order() {
    let file = |version: &[u8], header: &str, data: &[u8]| {
        let mut bytes = b"\x93NUMPY".to_vec();
        bytes.extend_from_slice(version);
        if version[0] == 1 {
            bytes.extend_from_slice(&(header.len() as u16).to_le_bytes());
        } else {
            bytes.extend_from_slice(&(header.len() as u32).to_le_bytes());
        }
        bytes.extend_from_slice(header.as_bytes());
        bytes.extend_from_slice(data);
        bytes
    };
    let expected = Ok(rows(3, &[&[1, 0, 2], &[0, 1, 1]]));
    let by_columns = file(
        &[2, 0],
        "{'descr': '|i1', 'fortran_order': True, 'shape': (2, 3), }\n",
        &[1, 0, 0, 1, 2, 1],
    );
    assert_eq!(read("h.npy", &by_columns, &field(3)), expected);
    let big_endian = file(
        &[1, 0],
        "{\"shape\":(2,3),\"fortran_order\":False,\"descr\":\">i2\"}",
        &[0, 1, 0, 0, 0, 2, 0, 0, 0, 1, 0, 1],
    );
    assert_eq!(read("h.npy", &big_endian, &field(3)), expected);

    let header = "{'descr': '<i8', 'fortran_order': False, 'shape': (1, 1), }";
    let negative = file(&[1, 0], header, &(-1i64).to_le_bytes());
    assert!(says("h.npy", 3, &negative).contains("-1 names no element of GF(3)"));
    let floats = header.replace("i8", "f8");
    assert!(says("h.npy", 3, &file(&[1, 0], &floats, &[0; 8])).contains("\"<f8\""));
    let line = header.replace("(1, 1)", "(1,)");
    assert!(says("h.npy", 3, &file(&[1, 0], &line, &[0; 8])).contains("two dimensions"));
    assert!(says("h.npy", 3, &file(&[1, 0], header, &[0; 7])).contains("asks for 8 bytes"));
}

#[test]
fn a_header_alone_cannot_claim_memory() {
    let huge = b"%%MatrixMarket matrix coordinate integer general\n1000000 1000000 1\n1 1 1\n";
    assert!(says("h.mtx", 2, huge).contains("more than the 2147483648 entries"));
    let large = b"%%MatrixMarket matrix coordinate integer general\n40000 40000 1\n1 1 1\n";
    assert!(says("h.mtx", 2, large).contains("too short"));
    let array = b"%%MatrixMarket matrix array integer general\n40000 40000\n1\n";
    assert!(says("h.mtx", 2, array).contains("too short"));
    let empty = b"%%MatrixMarket matrix array integer general\n0 18446744073709551615\n";
    assert!(says("h.mtx", 2, empty).starts_with("line 2"));
    assert!(says("h.alist", 2, b"40000 40000\n3 3\n").contains("too short"));
    assert!(says("h.json", 2, b"{\"columns\": 99999999999, \"entries\": []}").contains("columns"));
}

#[test]
fn what_is_wrong_in_a_file_is_said_with_its_line() {
    assert_eq!(
        says("h.txt", 4, b"0 1\n# gauge\n2 4\n"),
        "line 3: 4 names no element of GF(4); entries are integers from 0 to 3"
    );
    assert_eq!(
        says("h.txt", 2, b"1011\n"),
        "line 1: 1011 names no element of GF(2); entries are integers from 0 to 1"
    );
    assert_eq!(
        says("h.csv", 3, b"1,2\n1,-1\n"),
        "line 2: `-1` names no element of GF(3); entries are integers from 0 to 2"
    );
    assert_eq!(
        says("h.csv", 3, b"1,2\n1,2,0\n"),
        "line 2: this row has 3 entries, the first one has 2"
    );
    assert_eq!(
        says("h.csv", 3, b"1,\xff\n"),
        "line 1: this is not UTF-8 text"
    );
    assert_eq!(says("h.txt", 2, b"\n"), "there are no rows");
    assert_eq!(
        says(
            "h.mtx",
            2,
            b"%%MatrixMarket matrix coordinate integer general\n2 2 2\n1 1 1\n1 1 1\n"
        ),
        "line 4: row 1, column 1 is given twice"
    );
    assert_eq!(
        says(
            "h.mtx",
            2,
            b"%%MatrixMarket matrix coordinate integer general\n2 2 2\n1 1 1\n"
        ),
        "line 3: the file ends before the last entry announced"
    );
    assert_eq!(
        says(
            "h.mtx",
            2,
            b"%%MatrixMarket matrix coordinate real general\n1 1 1\n1 1 1\n"
        ),
        "line 1: entries of kind `real` name no field elements; write `integer` or `pattern`"
    );
    assert_eq!(
        says("h.alist", 2, b"2 1\n1 2\n1 1\n2\n1\n1\n1 1\n"),
        "line 7: the lists by rows and by columns disagree here"
    );
    assert_eq!(
        says("h.alist", 2, b"2 1\n1 1\n1 1\n1\n1\n1\n1\n"),
        "line 7: the list of row 1 lacks entries that the columns have"
    );
    assert_eq!(
        says(
            "h.json",
            2,
            b"{\"field\": {\"order\": 4}, \"entries\": [[1]]}"
        ),
        "the file is over GF(4), not GF(2)"
    );
    assert!(says("h.json", 2, b"{\n\"entries\": [[1, 1.5]]}").contains("row 0"));
    assert!(says("h.bin", 2, b"").contains(".mtx, .alist, .npy"));
    assert!(says("matrix", 2, b"").contains("does not say its format"));
}

#[test]
fn a_file_over_another_modulus_is_refused() {
    let matrix = rows(256, &[&[1, 2]]);
    let text = written("json", matrix);
    // x^8 + x^5 + x^3 + x + 1 is another primitive polynomial of degree 8.
    let other = Field::with_modulus(2, &[1, 1, 0, 1, 0, 1, 0, 0, 1], true).unwrap();
    let error = read("h.json", text.as_bytes(), &other).unwrap_err();
    assert!(
        error.says.contains("`x^8 + x^4 + x^3 + x^2 + 1`"),
        "{error}"
    );
}

#[test]
fn the_json_form_says_all_that_is_known() {
    let mut delivery = delivery(rows(4, &[&[1, 0, 3], &[0, 1, 2]]));
    delivery.what = What::GeneratorMatrix;
    delivery.form = Form::Systematic;
    delivery.information_positions = Some(vec![0, 1]);
    delivery.position_names = Some(vec!["data[1]".into(), "data[0]".into(), "check[0]".into()]);
    let bytes = (format("json").unwrap().write)(&delivery).unwrap();
    insta::assert_snapshot!(String::from_utf8(bytes).unwrap());
}

#[test]
fn rows_for_a_document_and_for_a_memory() {
    let matrix = rows(2, &[&[1, 0, 1], &[0, 1, 1]]);
    let tex = written("tex", matrix.clone());
    let mem = written("mem", matrix.clone());
    insta::assert_snapshot!(format!("{tex}\n{mem}"));
    let refusal = (format("mem").unwrap().write)(&delivery(rows(3, &[&[2]]))).unwrap_err();
    assert!(refusal.contains("GF(3)"));
}

#[test]
fn formats_have_names_of_their_own() {
    for (at, format) in FORMATS.iter().enumerate() {
        assert!(FORMATS[..at].iter().all(|other| other.name != format.name));
        assert!(!format.says.is_empty());
    }
}

#[test]
fn a_file_is_there_whole_or_not_at_all() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("out/new/h.mtx");
    write_whole(&path, b"first").unwrap();
    write_whole(&path, b"second").unwrap();
    assert_eq!(std::fs::read(&path).unwrap(), b"second");
    // A folder stands in the way: nothing is written, nothing is left over.
    let blocked = folder.path().join("out/blocked");
    std::fs::create_dir_all(blocked.join("inner")).unwrap();
    assert!(write_whole(&blocked, b"x").is_err());
    let mut names: Vec<_> = std::fs::read_dir(folder.path().join("out"))
        .unwrap()
        .map(|entry| entry.unwrap().file_name())
        .collect();
    names.sort();
    assert_eq!(names, ["blocked", "new"]);
}

#[test]
fn a_picture_has_the_size_it_states() {
    let bytes =
        (format("png").unwrap().write)(&delivery(rows(2, &[&[1, 0, 1], &[0, 1, 1]]))).unwrap();
    // PNG Specification, third edition, §5.2 and §11.2.1: signature, then IHDR with the sizes.
    assert_eq!(bytes[..16], *b"\x89PNG\r\n\x1a\n\0\0\0\x0dIHDR");
    let size = |at: usize| u32::from_be_bytes(bytes[at..at + 4].try_into().unwrap());
    assert_eq!((size(16), size(20)), (36, 24));
    assert!(bytes.ends_with(b"IEND\xae\x42\x60\x82"));
    let large = Matrix::zero(&field(2), 10_000, 10_000);
    let refusal = (format("png").unwrap().write)(&delivery(large)).unwrap_err();
    assert!(refusal.contains("take mtx or alist"), "{refusal}");
}
